import type { FrameCaution } from '@/lib/contracts/api/frame';

/** What deserves a second look, as people say it. */
export const cautionWords: Readonly<Record<FrameCaution, string>> = {
  'no-coordinates': 'no place known, so no airmass',
  'below-horizon': 'below the horizon',
  'below-pointing-limit': 'below the telescope’s lowest pointing',
  'sun-up': 'the Sun was up',
};
