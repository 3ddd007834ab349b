import { formatCount } from '@/lib/contracts/format-figure';
import { LinkButton } from '@/app/_components/ui/link-button';
import {
  calibratedPerPage,
  type CalibratedPageQuery,
  type CalibratedResult,
} from '@/lib/contracts/calibrated-page';
import { resultsAddress } from './results-address';

interface ResultsPagesProps {
  readonly night: string;
  readonly query: CalibratedPageQuery;
  readonly result: CalibratedResult;
}

/** Which stars of how many these are, and the way to the others. */
export function ResultsPages({ night, query, result: { page, nPages, nShown, stars } }: ResultsPagesProps) {
  const first = (page - 1) * calibratedPerPage + 1;
  const to = (number: number) =>
    resultsAddress(night, query, { page: number === 1 ? undefined : number, at: undefined });
  return (
    <nav
      aria-label="Pages of stars"
      className="flex flex-wrap items-center gap-2 border-t border-rule px-3.5 py-3"
    >
      <span className="mr-2 text-table text-ink-2">
        Stars {formatCount(first)} to {formatCount(first + stars.length - 1)} of {formatCount(nShown)}
      </span>
      {page > 2 ? <LinkButton href={to(1)}>First</LinkButton> : null}
      {page > 1 ? <LinkButton href={to(page - 1)}>Previous</LinkButton> : null}
      {page < nPages ? <LinkButton href={to(page + 1)}>Next</LinkButton> : null}
      {page < nPages - 1 ? <LinkButton href={to(nPages)}>Last</LinkButton> : null}
    </nav>
  );
}
