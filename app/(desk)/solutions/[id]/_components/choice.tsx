import { classNames } from '@/app/_components/ui/class-names';

interface ChoiceProps<T extends string> {
  readonly label: string;
  readonly options: readonly { readonly value: T; readonly words: string }[];
  readonly value: T;
  readonly onChange: (value: T) => void;
}

/** One of a few, at hand in the head of a panel; the chosen one is bold and underlined. */
export function Choice<T extends string>({ label, options, value, onChange }: ChoiceProps<T>) {
  return (
    <span
      role="group"
      aria-label={label}
      className="flex flex-wrap items-baseline gap-x-2 text-small text-ink-2"
    >
      <span aria-hidden="true">{label}:</span>
      {options.map((option) => (
        <button
          key={option.value}
          type="button"
          aria-pressed={option.value === value}
          onClick={() => onChange(option.value)}
          className={classNames(
            'min-h-6 min-w-6 hover:text-ink',
            option.value === value && 'font-semibold text-ink underline underline-offset-4',
          )}
        >
          {option.words}
        </button>
      ))}
    </span>
  );
}
