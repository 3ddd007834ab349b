import type { Route } from 'next';
import { LinkButton } from './_components/ui/link-button';

export default function NotFound() {
  return (
    <div className="max-w-prose py-10">
      <h1 className="text-title font-medium">Nothing is kept at this address</h1>
      <p className="mt-2 text-ink-2">
        It may have been mistyped, or it belongs to a programme or night that you may not see. If somebody
        sent you the link, ask them to name the night and the programme.
      </p>
      <p className="mt-4">
        <LinkButton href={'/' as Route}>Go to Tonight</LinkButton>
      </p>
    </div>
  );
}
