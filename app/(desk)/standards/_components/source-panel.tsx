import { formatFixed } from '@/lib/contracts/format-figure';
import { Panel } from '@/app/_components/ui/panel';

interface Source {
  readonly citation: string;
  readonly note: string;
  readonly defaultError: number;
}

/** Where the values come from, and what is assumed where the publication is silent. */
export function SourcePanel({ sources }: { readonly sources: readonly Source[] }) {
  return (
    <Panel title={sources.length === 1 ? 'Source' : 'Sources'}>
      {sources.map(({ citation, note, defaultError }) => (
        <div key={citation} className="max-w-prose">
          <p className="font-medium">{citation}</p>
          <p className="mt-1 text-ink-2">{note}</p>
          <p className="mt-1 text-ink-2">
            Where no standard error is published, {formatFixed(defaultError, 3)} mag is assumed.
          </p>
        </div>
      ))}
    </Panel>
  );
}
