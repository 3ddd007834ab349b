'use client';

import { useRouter } from 'next/navigation';
import { useCallback } from 'react';
import type { NightSolutionsPage } from '@/lib/contracts/solution-page';
import { SolutionList } from './solution-list';
import { SolvePanel } from './solve-panel';

interface SolutionsTabProps {
  readonly night: string;
  readonly page: NightSolutionsPage;
  readonly solutions: NonNullable<NightSolutionsPage['solutions']>;
  /** Id of the solution whose options are taken up. */
  readonly from: string | null;
}

export function SolutionsTab({ night, page, solutions, from }: SolutionsTabProps) {
  const router = useRouter();
  const refresh = useCallback(() => router.refresh(), [router]);
  return (
    <div className="grid grid-cols-1 gap-5">
      {page.maySolve ? (
        <SolvePanel night={night} page={page} from={solutions.find(({ id }) => id === from) ?? null} />
      ) : null}
      <SolutionList solutions={solutions} canBegin={page.maySolve && page.bands.length > 0} onEnd={refresh} />
    </div>
  );
}
