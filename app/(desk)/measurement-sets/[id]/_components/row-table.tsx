import { BandMark } from '@/app/_components/ui/band-mark';
import { Cell, DataTable, HeadCell, Row } from '@/app/_components/ui/data-table';
import { EmptyState } from '@/app/_components/ui/empty-state';
import { Figure } from '@/app/_components/ui/figure';
import { formatCount, formatFixed, formatPlain, noValue } from '@/lib/contracts/format-figure';
import { Pagination } from '@/app/_components/ui/pagination';
import { Panel } from '@/app/_components/ui/panel';
import type { MeasurementRow } from '@/lib/contracts/api/measurement-set';
import type { PageLinks } from './page-links';

interface RowTableProps {
  readonly rows: readonly MeasurementRow[];
  readonly links: PageLinks;
}

/** Rows as the file has them in order. */
export function RowTable({ rows, links }: RowTableProps) {
  if (rows.length === 0) {
    return (
      <Panel>
        <EmptyState title="No rows of yours">
          The set has rows, but on frames of other programmes only.
        </EmptyState>
      </Panel>
    );
  }
  return (
    <Panel flush>
      <DataTable caption="Rows of the set" head={<Head />}>
        {rows.map((row) => (
          <Row key={row.row}>
            <Cell numeric>{formatCount(row.row)}</Cell>
            <Cell numeric>{row.frame}</Cell>
            <Cell>
              {row.band === null ? noValue : <BandMark band={row.band} />} {row.band}
            </Cell>
            <Cell>{row.star === '' ? <span className="text-ink-2">by position</span> : row.star}</Cell>
            <Cell>{row.standard ?? noValue}</Cell>
            <Cell numeric>
              <Figure value={row.inst_mag} error={row.inst_err} />
            </Cell>
            <Cell numeric>{row.ra === null ? noValue : formatFixed(row.ra, 5)}</Cell>
            <Cell numeric>{row.dec === null ? noValue : formatFixed(row.dec, 5)}</Cell>
            <Cell numeric>{row.x === null ? noValue : formatFixed(row.x, 1)}</Cell>
            <Cell numeric>{row.y === null ? noValue : formatFixed(row.y, 1)}</Cell>
            <Cell numeric>{row.fwhm === null ? noValue : formatFixed(row.fwhm, 2)}</Cell>
            <Cell numeric>{row.sky === null ? noValue : formatPlain(row.sky, 5)}</Cell>
            <Cell numeric>{row.peak === null ? noValue : formatPlain(row.peak, 6)}</Cell>
            <Cell>{row.flag ?? ''}</Cell>
          </Row>
        ))}
      </DataTable>
      <Pagination noun="rows" {...links} />
    </Panel>
  );
}

function Head() {
  return (
    <Row>
      <HeadCell numeric>Row</HeadCell>
      <HeadCell numeric>Frame</HeadCell>
      <HeadCell>Band</HeadCell>
      <HeadCell>Star</HeadCell>
      <HeadCell>Standard</HeadCell>
      <HeadCell numeric unit="mag">
        Instrumental
      </HeadCell>
      <HeadCell numeric unit="deg J2000">
        Right ascension
      </HeadCell>
      <HeadCell numeric unit="deg J2000">
        Declination
      </HeadCell>
      <HeadCell numeric unit="pix">
        x
      </HeadCell>
      <HeadCell numeric unit="pix">
        y
      </HeadCell>
      <HeadCell numeric unit="pix">
        FWHM
      </HeadCell>
      <HeadCell numeric unit="counts">
        Sky
      </HeadCell>
      <HeadCell numeric unit="counts">
        Peak
      </HeadCell>
      <HeadCell>Flag</HeadCell>
    </Row>
  );
}
