'use client';

import { Button } from '@/app/_components/ui/button';
import { Finding } from '@/app/_components/ui/finding';
import { formatMinutes } from '@/app/_components/ui/format-time';
import { Panel } from '@/app/_components/ui/panel';
import { useLogQueue, type LinkState } from '../../../_components/queue/log-queue';
import { entryWords } from '../../../_components/queue/queue-entry';
import { useNight } from './night-provider';

const linkWords: Readonly<Record<LinkState, string>> = {
  idle: 'Waiting for their turn.',
  sending: 'Being sent now.',
  unreachable: 'The server cannot be reached. They are kept in this browser and sent as soon as it answers.',
  'signed-out':
    'You are no longer signed in. They are kept in this browser and sent once you have signed in again.',
};

/** What is not with the server yet, and why. Nothing here is lost by a dead link, a reload or a flat battery. */
export function WaitingPanel() {
  const { log, waiting } = useNight();
  const { entries, person, link, isKept, discard, sendNow } = useLogQueue();
  const others = entries.filter((entry) => entry.person === person.id && entry.night !== log.night.id);
  const strangers = [
    ...new Set(entries.filter((entry) => entry.person !== person.id).map(({ personName }) => personName)),
  ];
  const unsent = waiting.filter(({ refused }) => refused === null);
  const refused = waiting.filter((entry) => entry.refused !== null && entry.outgoing.kind !== 'frame');
  return (
    <Panel title="Waiting to be sent" note={unsent.length === 0 ? undefined : String(unsent.length)}>
      <div role="status">
        {unsent.length === 0 ? 'Nothing. Every entry is with the server.' : linkWords[link]}
      </div>
      {unsent.length === 0 ? null : (
        <ul className="mt-2 grid gap-0.5 text-table">
          {unsent.slice(0, 8).map((entry) => (
            <li key={entry.key}>
              <span className="font-mono text-ink-2">{formatMinutes(entry.madeAt)}</span> {entryWords(entry)}
            </li>
          ))}
          {unsent.length > 8 ? <li>and {unsent.length - 8} more</li> : null}
        </ul>
      )}
      {unsent.length > 0 && link === 'unreachable' ? (
        <Button className="mt-2" onClick={sendNow}>
          Try now
        </Button>
      ) : null}
      <div className="mt-2 grid gap-2 empty:hidden">
        {isKept || unsent.length === 0 ? null : (
          <Finding tone="warn">
            This browser keeps nothing: leave the page open until the entries are with the server.
          </Finding>
        )}
        {refused.map((entry) => (
          <Finding key={entry.key} tone="bad" word="Not logged">
            {entryWords(entry)}: {entry.refused?.detail}
            <Button look="quiet" onClick={() => discard(entry.key)}>
              Discard
            </Button>
          </Finding>
        ))}
        {others.length === 0 ? null : (
          <p className="text-small text-ink-2">
            {others.length} more for other nights:{' '}
            {[...new Set(others.map(({ nightName }) => nightName))].join('; ')}.
          </p>
        )}
        {strangers.length === 0 ? null : (
          <p className="text-small text-ink-2">
            Entries of {strangers.join(', ')} wait in this browser until they sign in here.
          </p>
        )}
      </div>
    </Panel>
  );
}
