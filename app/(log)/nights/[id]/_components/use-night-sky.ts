'use client';

import { useEffect, useMemo, useState } from 'react';
import type { NightSky } from '@/app/_components/charts/night-band/night-sky';
import type { NightLog } from '@/lib/contracts/night-log';
import { fieldsTaken } from '../../../_components/fields-taken';

/**
 * The night's sky: as the server made it, and once a field is taken that has no curve, reckoned here. The ephemeris is
 * fetched for that only; while it cannot be, the band lacks a curve and nothing else.
 */
export function useNightSky(log: NightLog, made: NightSky): NightSky {
  const [own, setOwn] = useState<NightSky | null>(null);
  const sky = own ?? made;
  const fields = useMemo(() => fieldsTaken(log.frames), [log.frames]);
  const lacks = fields.some(({ name }) => sky.curves.every((curve) => curve.name !== name));
  const { date } = log.night;
  useEffect(() => {
    if (!lacks) return;
    let isWanted = true;
    const cover = log.frames.map(({ utc_mid }) => Date.parse(utc_mid));
    import('@/app/_components/charts/night-band/night-sky').then(
      ({ nightSky }) => {
        if (isWanted) setOwn(nightSky({ site: log.site, date, fields, cover }));
      },
      // The link is down: the next frame tries again.
      () => undefined,
    );
    return () => {
      isWanted = false;
    };
  }, [lacks, fields, log.frames, log.site, date]);
  return sky;
}
