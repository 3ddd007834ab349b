import { Fragment, type ReactNode } from 'react';
import { classNames } from './class-names';

export interface KeyValue {
  readonly key: string;
  readonly value: ReactNode;
  /** Figures and identifiers, in Mono. */
  readonly figure?: boolean;
}

export function KeyValues({ items }: { readonly items: readonly KeyValue[] }) {
  return (
    <dl className="grid grid-cols-[auto_1fr] gap-x-3.5 gap-y-1 text-table">
      {items.map(({ key, value, figure = false }) => (
        <Fragment key={key}>
          <dt className="text-ink-2">{key}</dt>
          <dd className={classNames('min-w-0 text-right wrap-anywhere', figure && 'font-mono')}>{value}</dd>
        </Fragment>
      ))}
    </dl>
  );
}
