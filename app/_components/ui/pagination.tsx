import type { Route } from 'next';
import { LinkButton } from './link-button';

interface PaginationProps {
  /** “nights”, for “Further nights”. */
  readonly noun: string;
  /** Address of the first page; null when this is it. */
  readonly first: Route | null;
  /** Address of what follows; null at the end. */
  readonly next: Route | null;
}

/** Lists run on by cursor: there is a start and a next, no page numbers. */
export function Pagination({ noun, first, next }: PaginationProps) {
  if (first === null && next === null) return null;
  return (
    <nav aria-label={`Pages of ${noun}`} className="flex gap-2 px-3.5 py-3">
      {first === null ? null : <LinkButton href={first}>First {noun}</LinkButton>}
      {next === null ? (
        <span className="self-center text-small text-ink-2">These are the last.</span>
      ) : (
        <LinkButton href={next}>Further {noun}</LinkButton>
      )}
    </nav>
  );
}
