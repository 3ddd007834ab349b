type Values = Readonly<Record<string, unknown>>;

interface ValueChangesProps {
  readonly before: Values | null;
  readonly after: Values | null;
}

/** How many changes stand open; the others fold. */
const shown = 4;

function written(value: unknown): string {
  if (value === null || value === undefined || value === '') return 'nothing';
  if (typeof value === 'string') return value;
  if (Array.isArray(value) && value.every((one) => typeof one !== 'object')) {
    return value.length === 0 ? 'none' : value.join(', ');
  }
  return JSON.stringify(value);
}

function Change({
  name,
  before,
  after,
}: {
  readonly name: string;
  readonly before: unknown;
  readonly after: unknown;
}) {
  return (
    <li className="break-words">
      <span className="text-ink-2">{name}: </span>
      {before === undefined ? null : (
        <>
          <span>{written(before)}</span>
          <span aria-hidden="true"> → </span>
          <span className="sr-only"> became </span>
        </>
      )}
      <span>{written(after)}</span>
    </li>
  );
}

/** What an act changed, field by field; the values before it where there were any. */
export function ValueChanges({ before, after }: ValueChangesProps) {
  const names = [...new Set([...Object.keys(before ?? {}), ...Object.keys(after ?? {})])].filter(
    (name) => JSON.stringify(before?.[name]) !== JSON.stringify(after?.[name]),
  );
  const rows = names.map((name) => (
    <Change key={name} name={name} before={before?.[name]} after={after?.[name] ?? null} />
  ));
  if (rows.length === 0) return null;
  return (
    <>
      <ul className="max-w-xl">{rows.slice(0, shown)}</ul>
      {rows.length > shown ? (
        <details>
          <summary className="text-small text-ink-2 underline">{rows.length - shown} more</summary>
          <ul className="max-w-xl">{rows.slice(shown)}</ul>
        </details>
      ) : null}
    </>
  );
}
