'use client';

import { useEffect, useId, useState } from 'react';
import { Panel } from '@/app/_components/ui/panel';
import type { FieldStar } from './field-star';
import { SkyChart } from './sky-chart';
import { StarDetails } from './star-details';
import { StarTable } from './star-table';

interface FieldStarsProps {
  readonly stars: readonly FieldStar[];
  /** Name of the star to begin with. */
  readonly initial: string | undefined;
}

/** Chart, table and one star's particulars, linked: whatever one points at in one is marked in the others. */
export function FieldStars({ stars, initial }: FieldStarsProps) {
  const [active, setActive] = useState(() =>
    Math.max(
      0,
      stars.findIndex(({ name }) => name === initial),
    ),
  );
  const tableId = useId();
  const star = stars[active];
  useEffect(() => {
    const place = stars.findIndex(({ name }) => name === initial);
    if (place > 0) scrollWithinTable(document.getElementById(`${tableId}-${place}`));
  }, [stars, initial, tableId]);
  const pick = (index: number): void => {
    setActive(index);
    // From the chart to the row that says more: it may be scrolled away.
    document.getElementById(`${tableId}-${index}`)?.focus();
  };
  return (
    <div className="mb-4 grid items-start gap-4 lg:grid-cols-[minmax(0,30rem)_minmax(0,1fr)]">
      <div className="grid gap-4">
        <Panel title="Chart" note="North up, east left">
          <SkyChart stars={stars} active={active} onPoint={setActive} onPick={pick} />
        </Panel>
        {star === undefined ? null : (
          <Panel title={star.name} note={star.isUsable ? undefined : 'not to be used'}>
            <StarDetails star={star} />
          </Panel>
        )}
      </div>
      <Panel title="Stars" note="Arrow keys move from star to star" flush>
        <StarTable id={tableId} stars={stars} active={active} onPoint={setActive} />
      </Panel>
    </div>
  );
}

/** The star that a link leads to may stand far down in its table: the table moves, the page stays. */
function scrollWithinTable(row: HTMLElement | null): void {
  const box = row?.closest('[role=region]');
  if (!row || !box) return;
  const below = row.getBoundingClientRect().top - box.getBoundingClientRect().top;
  box.scrollTop += below - box.clientHeight / 2;
}
