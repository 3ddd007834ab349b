'use client';

import { useEffect, useState } from 'react';
import { callApi } from '@/app/_components/hooks/call-api';
import { listResiduals, type SolutionObservation } from '@/lib/contracts/api/solution';

export interface Observations {
  readonly items: readonly SolutionObservation[];
  readonly standing: 'reading' | 'whole' | 'broken off';
  readonly again: () => void;
}

const perPage = 1000;

/** Every observation of a solution, page after page. One that is broken off keeps what has come. */
export function useObservations(solution: string): Observations {
  const [items, setItems] = useState<readonly SolutionObservation[]>([]);
  const [standing, setStanding] = useState<Observations['standing']>('reading');
  const [tries, setTries] = useState(0);
  useEffect(() => {
    const leaving = new AbortController();
    const read = async () => {
      let rows: readonly SolutionObservation[] = [];
      for (let after: string | null = ''; after !== null;) {
        const query: Record<string, string> = { limit: String(perPage), ...(after === '' ? {} : { after }) };
        const result = await callApi(listResiduals, {
          params: { id: solution },
          query,
          signal: leaving.signal,
        });
        if (!result.ok) return setStanding('broken off');
        rows = [...rows, ...result.value.items];
        after = result.value.next;
        setItems(rows);
      }
      setStanding('whole');
    };
    read().catch((error: unknown) => {
      // Left before it came: nobody waits for it.
      if (!leaving.signal.aborted) throw error;
    });
    return () => leaving.abort();
  }, [solution, tries]);
  const again = () => {
    setStanding('reading');
    setTries((count) => count + 1);
  };
  return { items, standing, again };
}
