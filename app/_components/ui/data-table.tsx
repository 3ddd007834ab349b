import type { ComponentProps, ReactNode } from 'react';
import { classNames } from './class-names';

interface DataTableProps {
  /** What the table holds; read out, not shown. */
  readonly caption: string;
  readonly head: ReactNode;
  readonly children: ReactNode;
  /** Height at which it scrolls inside its box, any CSS length; without it the page scrolls. */
  readonly maxHeight?: string;
  readonly className?: string;
}

/**
 * A table in a box that scrolls sideways on narrow screens, so that the page never does. The box takes focus, or a
 * keyboard could not scroll it.
 */
export function DataTable({ caption, head, children, maxHeight, className }: DataTableProps) {
  return (
    <div
      role="region"
      aria-label={caption}
      tabIndex={0}
      className={classNames('relative overflow-auto focus-visible:-outline-offset-2', className)}
      style={maxHeight === undefined ? undefined : { maxHeight }}
    >
      <table className="w-full border-separate border-spacing-0 text-table">
        <caption className="sr-only">{caption}</caption>
        <thead className="sticky top-0 z-10 bg-sheet">{head}</thead>
        <tbody>{children}</tbody>
      </table>
    </div>
  );
}

interface HeadCellProps extends ComponentProps<'th'> {
  readonly numeric?: boolean;
  /** Unit, on a second line. */
  readonly unit?: ReactNode;
}

export function HeadCell({ numeric = false, unit, className, children, ...rest }: HeadCellProps) {
  return (
    <th
      scope="col"
      {...rest}
      className={classNames(
        'border-b border-rule-strong px-2 py-1.5 align-bottom text-small font-medium whitespace-nowrap text-ink-2 first:pl-3.5 last:pr-3.5',
        numeric ? 'text-right' : 'text-left',
        className,
      )}
    >
      {children}
      {unit === undefined ? null : <small className="block text-fine font-normal">{unit}</small>}
    </th>
  );
}

interface RowProps extends ComponentProps<'tr'> {
  readonly selected?: boolean;
  /** Left out of what is computed: struck by a mark before its first cell, and by a word for those who listen. */
  readonly out?: boolean;
}

export function Row({ selected = false, out = false, className, ...rest }: RowProps) {
  return (
    <tr
      {...rest}
      aria-selected={selected || undefined}
      data-out={out || undefined}
      className={classNames(
        'group',
        selected && 'bg-accent-wash dark-site:font-medium',
        out &&
          'text-ink-2 [&>:first-child]:before:text-bad [&>:first-child]:before:content-["✕_"/"left_out_"]',
        className,
      )}
    />
  );
}

interface CellProps extends ComponentProps<'td'> {
  readonly numeric?: boolean;
  /** Identifiers in Mono, left-aligned. */
  readonly mono?: boolean;
  /** Text that may wrap: comments, reasons. */
  readonly wrap?: boolean;
  /** The cell names its row. */
  readonly heading?: boolean;
}

export function Cell({
  numeric = false,
  mono = false,
  wrap = false,
  heading = false,
  className,
  ...rest
}: CellProps) {
  const classes = classNames(
    'border-b border-rule px-2 py-1.5 first:pl-3.5 last:pr-3.5 text-left font-normal',
    numeric && 'text-right font-mono',
    mono && 'font-mono',
    wrap ? 'min-w-32' : 'whitespace-nowrap',
    className,
  );
  return heading ? <th scope="row" {...rest} className={classes} /> : <td {...rest} className={classes} />;
}
