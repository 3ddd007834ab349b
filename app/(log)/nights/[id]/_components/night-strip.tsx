'use client';

import { useMemo } from 'react';
import { AddressedBand } from '../../../_components/addressed-band';
import { bandConditions, bandFrames } from '../../../_components/band-data';
import { useNight } from './night-provider';

/** The night band of this night, with what was logged a moment ago. */
export function NightStrip() {
  const { log, sky, serverNow } = useNight();
  const frames = useMemo(() => bandFrames(log.frames), [log.frames]);
  const conditions = useMemo(() => bandConditions(log.conditions), [log.conditions]);
  return <AddressedBand sky={sky} frames={frames} conditions={conditions} serverNow={serverNow} />;
}
