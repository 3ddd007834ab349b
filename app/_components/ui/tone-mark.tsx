export type Tone = 'good' | 'warn' | 'bad';

export const toneText: Readonly<Record<Tone, string>> = {
  good: 'text-good',
  warn: 'text-warn',
  bad: 'text-bad',
};

/** The shape that says what colour says: a tick in a ring, a triangle, a cross in a square. */
export function ToneMark({ tone }: { readonly tone: Tone }) {
  return (
    <svg viewBox="0 0 16 16" aria-hidden="true" className="inline-block size-3.5 shrink-0 align-[-2px]">
      <g fill="none" stroke="currentColor" strokeWidth="1.5">
        {tone === 'good' ? (
          <>
            <circle cx="8" cy="8" r="6.5" />
            <path d="M5 8.3l2.2 2.2L11.2 6" />
          </>
        ) : null}
        {tone === 'warn' ? <path d="M8 1.8L14.8 14H1.2zM8 6v4M8 11.2v1.4" /> : null}
        {tone === 'bad' ? <path d="M1.8 1.8h12.4v12.4H1.8zM5 5l6 6m0-6l-6 6" /> : null}
      </g>
    </svg>
  );
}
