import type { Route } from 'next';
import Link from 'next/link';
import { formatDateInWords, formatMonthInWords } from '@/app/_components/ui/format-time';
import { LinkButton } from '@/app/_components/ui/link-button';
import { Panel } from '@/app/_components/ui/panel';
import { nightsAddress, shiftMonth, weeksOf, type NightsQuery } from './nights-query';

interface CalendarNight {
  readonly id: string;
  readonly telescope: string;
  readonly date: string;
  readonly state: string;
  readonly frames: number;
}

interface NightsCalendarProps {
  readonly month: string;
  readonly today: string;
  readonly nights: readonly CalendarNight[];
  readonly query: NightsQuery;
  /** With one telescope its name would stand in every cell. */
  readonly showsTelescope: boolean;
}

const weekdays = ['Mon', 'Tue', 'Wed', 'Thu', 'Fri', 'Sat', 'Sun'] as const;

/** A state's sign in a small cell; its word is beside it for those who listen. */
const signs: Readonly<Record<string, string>> = { open: '○', closed: '●', calibrated: '◆' };

function Day({
  date,
  nights,
  isToday,
  showsTelescope,
}: {
  readonly date: string;
  readonly nights: readonly CalendarNight[];
  readonly isToday: boolean;
  readonly showsTelescope: boolean;
}) {
  return (
    <>
      <span className={isToday ? 'font-semibold underline' : 'text-ink-2'}>
        {Number(date.slice(8))}
        {isToday ? <span className="sr-only"> (today)</span> : null}
      </span>
      {nights.map(({ id, telescope, state, frames }) => (
        <Link
          key={id}
          href={`/nights/${id}` as Route}
          className="mt-0.5 block min-h-6 rounded-tag bg-accent-wash px-1 py-0.5 text-ink no-underline hover:underline"
        >
          <span aria-hidden="true">{signs[state] ?? ''} </span>
          <span className="sr-only">{`${formatDateInWords(date)}, ${telescope}, ${state}: `}</span>
          {showsTelescope ? `${telescope} ` : ''}
          <span className="font-mono">{frames}</span>
          <span className="max-md:sr-only"> frames</span>
        </Link>
      ))}
    </>
  );
}

/** A month of nights: which there were, in which state, with how many frames. */
export function NightsCalendar({ month, today, nights, query, showsTelescope }: NightsCalendarProps) {
  const to = (by: number) =>
    nightsAddress(query, { month: shiftMonth(month, by), after: undefined }) as Route;
  return (
    <Panel
      title={formatMonthInWords(month)}
      note="evening dates; ○ open, ● closed, ◆ calibrated"
      flush
      actions={
        <>
          <LinkButton href={to(-1)}>
            <span aria-hidden="true">‹</span>
            <span className="sr-only">Month before</span>
          </LinkButton>
          <LinkButton href={to(1)}>
            <span aria-hidden="true">›</span>
            <span className="sr-only">Month after</span>
          </LinkButton>
        </>
      }
    >
      <table className="w-full table-fixed text-small">
        <caption className="sr-only">Nights of {formatMonthInWords(month)}</caption>
        <thead>
          <tr>
            {weekdays.map((day) => (
              <th key={day} scope="col" className="px-1.5 py-1 text-left font-medium text-ink-2">
                {day}
              </th>
            ))}
          </tr>
        </thead>
        <tbody>
          {weeksOf(month).map((week, row) => (
            <tr key={row} className="align-top">
              {week.map((date, column) => (
                <td key={column} className="h-14 border-t border-rule px-1.5 py-1">
                  {date === null ? null : (
                    <Day
                      date={date}
                      nights={nights.filter((night) => night.date === date)}
                      isToday={date === today}
                      showsTelescope={showsTelescope}
                    />
                  )}
                </td>
              ))}
            </tr>
          ))}
        </tbody>
      </table>
    </Panel>
  );
}
