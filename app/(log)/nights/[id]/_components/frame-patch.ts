import type { Frame, FrameCorrection, FrameInput } from '@/lib/contracts/api/frame';

type Change = Omit<FrameCorrection, 'version' | 'reason'>;

/** Blanks of an input are absent, of a frame null: the same thing. */
const same = (a: unknown, b: unknown) => (a ?? null) === (b ?? null);

/** What differs between a frame and what was typed over it. Nothing else is sent, so that nothing else is recorded. */
export function frameChange(frame: Frame, input: FrameInput): Change {
  const { number, type, file, object, programme, ra, dec, band, utc_start, exposure, fwhm, sky, comment } =
    input;
  const wanted = {
    number,
    type,
    file: file ?? null,
    object,
    programme: programme ?? null,
    ra: ra ?? null,
    dec: dec ?? null,
    band: band ?? null,
    utc_start,
    exposure,
    fwhm: fwhm ?? null,
    sky: sky ?? null,
    comment,
  };
  const differs = Object.entries(wanted).filter(([name, value]) => {
    const now = frame[name as keyof typeof wanted];
    if (name === 'utc_start') return Date.parse(String(value)) !== Date.parse(String(now));
    return value !== undefined && !same(value, now);
  });
  return Object.fromEntries(differs) as Change;
}
