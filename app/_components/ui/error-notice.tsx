import type { ReactNode, Ref } from 'react';
import type { Issue } from '@/lib/faults/fault';
import { ToneMark } from './tone-mark';

/** A fault as it crosses to a page: plain data. */
export interface NoticeFault {
  readonly detail: string;
  readonly code?: string;
  readonly issues?: readonly Issue[];
  /** Under which the log keeps what happened. */
  readonly reference?: string | undefined;
}

interface ErrorNoticeProps {
  readonly fault: NoticeFault;
  readonly title?: string;
  /** What to do: a button to try again, a link. */
  readonly action?: ReactNode;
  /** Issues listed; the rest is counted. */
  readonly limit?: number;
  readonly ref?: Ref<HTMLDivElement>;
}

function place({ line, column, path }: Issue): string {
  if (line !== undefined) return column === undefined ? `Line ${line}` : `Line ${line}, column ${column}`;
  return column ?? path;
}

/** What happened, where (line, column, value) and what to do about it. */
export function ErrorNotice({ fault, title, action, limit = 20, ref }: ErrorNoticeProps) {
  const issues = fault.issues ?? [];
  return (
    <div
      ref={ref}
      role="alert"
      tabIndex={-1}
      className="rounded-panel border-2 border-bad bg-bad-wash px-3.5 py-3 text-ink"
    >
      <p className="font-semibold text-bad">
        <ToneMark tone="bad" /> {title ?? 'This did not work'}
      </p>
      <p className="mt-1">{fault.detail}</p>
      {issues.length > 0 ? (
        <ul className="mt-2 list-disc space-y-1 pl-5 text-table">
          {issues.slice(0, limit).map((issue, index) => (
            <li key={index}>
              {place(issue) === '' ? null : <b className="font-medium">{place(issue)}: </b>}
              {issue.value === undefined ? null : (
                <>
                  <code className="wrap-anywhere">{issue.value}</code>{' '}
                </>
              )}
              {issue.message}
              {issue.remedy === undefined ? null : <span className="block">{issue.remedy}</span>}
            </li>
          ))}
        </ul>
      ) : null}
      {issues.length > limit ? <p className="mt-1 text-table">and {issues.length - limit} more.</p> : null}
      {fault.reference === undefined ? null : (
        <p className="mt-2 text-small">
          Reference <code>{fault.reference}</code>: the log holds the details under it.
        </p>
      )}
      {action === undefined ? null : <div className="mt-3">{action}</div>}
    </div>
  );
}
