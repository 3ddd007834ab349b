import Link from 'next/link';
import type { Route } from 'next';
import { Cell, DataTable, HeadCell, Row } from '@/app/_components/ui/data-table';
import { formatDeclination, formatRightAscension } from '@/lib/astro/format-sexagesimal';
import { formatFixed, noValue } from '@/lib/contracts/format-figure';
import { formatDateInWords, formatMinutes } from '@/app/_components/ui/format-time';
import { Panel } from '@/app/_components/ui/panel';

interface Tonight {
  readonly airmass: number;
  readonly utc: number;
  readonly from: number;
  readonly to: number;
  readonly moonSeparation: number;
}
interface FieldLine {
  readonly name: string;
  readonly slug: string;
  readonly nStars: number;
  readonly nUsable: number;
  readonly ra: number;
  readonly dec: number;
  readonly V: readonly [number, number];
  readonly BV: readonly [number, number];
  readonly tonight: Tonight | null;
}
interface FieldTableProps {
  readonly fields: readonly FieldLine[];
  readonly list: {
    readonly telescope: { readonly name: string; readonly minAltitude: number } | null;
    readonly night: { readonly date: string; readonly start: number; readonly end: number } | null;
  };
  /** Code that was asked for, to be kept in the links. */
  readonly telescope: string | undefined;
}

const range = ([low, high]: readonly [number, number], decimals: number): string =>
  low === high
    ? formatFixed(low, decimals)
    : `${formatFixed(low, decimals)} to ${formatFixed(high, decimals)}`;

/** Where and when `Tonight` holds, in one line. */
export function tonightNote({ telescope, night }: FieldTableProps['list']): string {
  if (telescope === null) return 'No telescope is set up yet, so there is no airmass for tonight.';
  if (night === null) return `It does not get dark at ${telescope.name} tonight.`;
  const hours = `${formatMinutes(night.start)} to ${formatMinutes(night.end)} UTC`;
  return `Night of ${formatDateInWords(night.date)} at ${telescope.name}, dark from ${hours}, above ${formatFixed(telescope.minAltitude, 0)}° altitude`;
}

export function FieldTable({ fields, list, telescope }: FieldTableProps) {
  const query = telescope === undefined ? '' : `?telescope=${encodeURIComponent(telescope)}`;
  return (
    <Panel title="Fields" note={tonightNote(list)} className="mb-4" flush>
      {fields.length === 0 ? <p className="px-3.5 py-3 text-ink-2">None is observable tonight.</p> : null}
      <DataTable
        caption="Standard fields in the order of right ascension"
        head={
          <Row>
            <HeadCell>Field</HeadCell>
            <HeadCell numeric>Stars</HeadCell>
            <HeadCell numeric unit="J2000">
              Right ascension
            </HeadCell>
            <HeadCell numeric unit="J2000">
              Declination
            </HeadCell>
            <HeadCell numeric unit="mag">
              V
            </HeadCell>
            <HeadCell numeric unit="mag">
              B−V
            </HeadCell>
            <HeadCell numeric unit="tonight">
              Best airmass
            </HeadCell>
            <HeadCell numeric unit="UTC">
              at
            </HeadCell>
            <HeadCell numeric unit="UTC">
              Observable
            </HeadCell>
            <HeadCell numeric unit="deg">
              Moon away
            </HeadCell>
          </Row>
        }
      >
        {fields.map((field) => (
          <Row key={field.slug}>
            <Cell heading>
              <Link href={`/standards/${field.slug}${query}` as Route}>{field.name}</Link>
            </Cell>
            <Cell numeric>
              {field.nStars}
              {field.nUsable < field.nStars ? (
                <span className="font-sans text-ink-2"> ({field.nStars - field.nUsable} not to be used)</span>
              ) : null}
            </Cell>
            <Cell numeric>{formatRightAscension(field.ra, 0)}</Cell>
            <Cell numeric>{formatDeclination(field.dec, 0)}</Cell>
            <Cell numeric>{range(field.V, 1)}</Cell>
            <Cell numeric>{range(field.BV, 2)}</Cell>
            <TonightCells tonight={field.tonight} />
          </Row>
        ))}
      </DataTable>
    </Panel>
  );
}

function TonightCells({ tonight }: { readonly tonight: Tonight | null }) {
  if (tonight === null) {
    return (
      <>
        <Cell numeric>{noValue}</Cell>
        <Cell numeric>{noValue}</Cell>
        <Cell numeric>
          <span className="font-sans text-ink-2">not tonight</span>
        </Cell>
        <Cell numeric>{noValue}</Cell>
      </>
    );
  }
  return (
    <>
      <Cell numeric>{formatFixed(tonight.airmass, 2)}</Cell>
      <Cell numeric>{formatMinutes(tonight.utc)}</Cell>
      <Cell numeric>
        {formatMinutes(tonight.from)} to {formatMinutes(tonight.to)}
      </Cell>
      <Cell numeric>{formatFixed(tonight.moonSeparation, 0)}</Cell>
    </>
  );
}
