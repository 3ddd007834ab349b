import { Figure } from '@/app/_components/ui/figure';
import { formatDeclination, formatRightAscension } from '@/lib/astro/format-sexagesimal';
import { formatFixed, formatSigned } from '@/lib/contracts/format-figure';
import { KeyValues } from '@/app/_components/ui/key-values';
import type { FieldStar } from './field-star';

/** One star's particulars. */
export function StarDetails({ star }: { readonly star: FieldStar }) {
  const error =
    star.eV === null
      ? `none published; ${formatFixed(star.defaultError, 3)} mag assumed`
      : 'published, beside the values';
  return (
    <>
      {star.caution === '' ? null : (
        <p className={star.isUsable ? 'mb-2 text-warn' : 'mb-2 font-medium text-bad'}>
          <span aria-hidden="true">{star.isUsable ? '△ ' : '✕ '}</span>
          {star.caution}
        </p>
      )}
      <KeyValues
        items={[
          { key: 'V', value: <Figure value={star.v} error={star.eV} /> },
          { key: 'B−V', value: <Figure value={star.bv} error={star.eBv} /> },
          {
            key: 'Position, J2000',
            value: `${formatRightAscension(star.ra, 2)} ${formatDeclination(star.dec, 1)}`,
            figure: true,
          },
          {
            key: 'Proper motion, mas per year',
            value:
              star.pmRa === null
                ? 'not published'
                : `${formatSigned(star.pmRa, 1)} ${formatSigned(star.pmDec, 1)}`,
            figure: star.pmRa !== null,
          },
          { key: 'Standard errors', value: error },
          { key: 'Source', value: star.source },
        ]}
      />
    </>
  );
}
