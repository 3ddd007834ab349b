import type { Route } from 'next';
import Link from 'next/link';
import { memo } from 'react';
import { BandMark } from '@/app/_components/ui/band-mark';
import { Cell, Row } from '@/app/_components/ui/data-table';
import { formatFixed, formatPlain } from '@/lib/contracts/format-figure';
import { formatClock } from '@/app/_components/ui/format-time';
import { StateTag } from '@/app/_components/ui/state-tag';
import { ToneMark } from '@/app/_components/ui/tone-mark';
import type { Frame, FrameInput } from '@/lib/contracts/api/frame';
import { auditAddress } from '@/lib/contracts/audit';
import type { Band } from '@/lib/contracts/bands';
import { cautionWords } from './caution-words';

function BandCell({ band, isTarget }: { readonly band: Band | null; readonly isTarget: boolean }) {
  return (
    <Cell>
      {band === null ? null : (
        <>
          <BandMark band={band} hollow={isTarget} /> {band}
        </>
      )}
    </Cell>
  );
}

const blankIfNone = (value: number | null, decimals: number) =>
  value === null ? '' : formatFixed(value, decimals);

interface FrameRowProps {
  readonly frame: Frame;
  readonly isSelected: boolean;
  /** Null for those who may not correct. */
  readonly onCorrect: ((frame: Frame) => void) | null;
}

export const FrameRow = memo(function FrameRow({ frame, isSelected, onCorrect }: FrameRowProps) {
  const { number, type, object, field, band, comment, cautions } = frame;
  return (
    <Row selected={isSelected}>
      <Cell heading numeric>
        {number}
      </Cell>
      <Cell>{type}</Cell>
      <Cell>
        {object}
        {field !== null && field !== object ? <span className="text-ink-2"> ({field})</span> : null}
      </Cell>
      <BandCell band={band} isTarget={type === 'target'} />
      <Cell numeric>{formatClock(frame.utc_mid)}</Cell>
      <Cell numeric>{formatPlain(frame.exposure)}</Cell>
      <Cell numeric>{blankIfNone(frame.airmass, 3)}</Cell>
      <Cell numeric>{blankIfNone(frame.hour_angle, 2)}</Cell>
      <Cell numeric>{blankIfNone(frame.fwhm, 1)}</Cell>
      <Cell numeric>{blankIfNone(frame.sky, 1)}</Cell>
      <Cell mono>{frame.programme}</Cell>
      <Cell wrap>
        {comment}
        {frame.version === 1 ? null : (
          <Link
            href={auditAddress({ about: 'frame', subject: frame.id }, {}) as Route}
            className="block text-small text-ink-2"
          >
            corrected
          </Link>
        )}
        {cautions.length === 0 ? null : (
          <span className="block text-small text-warn">
            <ToneMark tone="warn" /> {cautions.map((caution) => cautionWords[caution]).join('; ')}
          </span>
        )}
      </Cell>
      {onCorrect === null ? null : (
        <Cell>
          <button
            type="button"
            onClick={() => onCorrect(frame)}
            aria-label={`Correct frame ${number}`}
            className="-my-0.5 min-h-6 text-ink-2 underline hover:text-ink"
          >
            Correct
          </button>
        </Cell>
      )}
    </Row>
  );
});

interface WaitingRowProps {
  readonly input: FrameInput;
  readonly hasActions: boolean;
}

/** A frame that is on its way: what was typed, without what only the server reckons. */
export function WaitingRow({ input, hasActions }: WaitingRowProps) {
  const mid = Date.parse(input.utc_start) + input.exposure * 500;
  return (
    <Row>
      <Cell heading numeric>
        {input.number}
      </Cell>
      <Cell>{input.type}</Cell>
      <Cell>{input.object}</Cell>
      <BandCell band={input.band ?? null} isTarget={input.type === 'target'} />
      <Cell numeric>{formatClock(mid)}</Cell>
      <Cell numeric>{formatPlain(input.exposure)}</Cell>
      <Cell colSpan={4}>
        <StateTag state="waiting to be sent" tone="warn" />
      </Cell>
      <Cell mono>{input.programme}</Cell>
      <Cell wrap>{input.comment}</Cell>
      {hasActions ? <Cell /> : null}
    </Row>
  );
}
