import Link from 'next/link';
import type { Route } from 'next';
import type { Solution } from '@/lib/contracts/api/solution';

interface OtherChoiceProps {
  readonly solution: string;
  readonly others: readonly Solution[];
  readonly chosen: string;
}

/** Which solution of the night it is compared with. */
export function OtherChoice({ solution, others, chosen }: OtherChoiceProps) {
  return (
    <nav aria-label="Compared with" className="mb-4">
      <ul className="flex flex-wrap gap-x-4 gap-y-1">
        <li className="text-ink-2">Compared with</li>
        {others.map(({ id, number, state }) => (
          <li key={id}>
            <Link
              href={`/solutions/${solution}/compare?with=${id}` as Route}
              aria-current={id === chosen ? 'page' : undefined}
              className="inline-block min-h-6 aria-[current]:font-semibold"
            >
              solution {number} ({state})
            </Link>
          </li>
        ))}
      </ul>
    </nav>
  );
}
