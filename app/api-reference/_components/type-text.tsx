import type { TypeWord } from '@/lib/contracts/api/type-words';

/** A type in words; the names of schemas lead to them. */
export function TypeText({ type }: { readonly type: readonly TypeWord[] }) {
  return (
    <>
      {type.map(({ text, schema }, index) =>
        schema === undefined ? (
          <span key={index}>{text}</span>
        ) : (
          <a key={index} href={`#schema-${schema}`} className="underline">
            {text}
          </a>
        ),
      )}
    </>
  );
}
