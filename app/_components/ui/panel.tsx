import { useId, type ReactNode } from 'react';
import { classNames } from './class-names';

interface PanelProps {
  readonly title?: ReactNode;
  /** A quieter second part of the title. */
  readonly note?: ReactNode;
  readonly actions?: ReactNode;
  /** Tables go to the edge; everything else keeps a margin. */
  readonly flush?: boolean;
  readonly className?: string;
  readonly children: ReactNode;
}

export function Panel({ title, note, actions, flush = false, className, children }: PanelProps) {
  const id = useId();
  const hasHead = title !== undefined;
  return (
    <section
      aria-labelledby={hasHead ? id : undefined}
      className={classNames('min-w-0 rounded-panel border border-rule bg-sheet', className)}
    >
      {hasHead ? (
        <div className="flex flex-wrap items-baseline gap-x-2.5 gap-y-1 border-b border-rule px-3.5 py-2.5">
          <h2 id={id} className="text-table font-semibold">
            {title}
          </h2>
          {note === undefined ? null : <span className="text-small text-ink-2">{note}</span>}
          {actions === undefined ? null : (
            <span className="ml-auto flex flex-wrap items-center gap-2">{actions}</span>
          )}
        </div>
      ) : null}
      <div className={flush ? undefined : 'px-3.5 py-3'}>{children}</div>
    </section>
  );
}
