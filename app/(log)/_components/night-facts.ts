import type { NightSky } from '@/app/_components/charts/night-band/night-sky';
import { formatDuration, formatMinutes } from '@/app/_components/ui/format-time';
import type { KeyValue } from '@/app/_components/ui/key-values';

const minutesBetween = (from: number, to: number) => (to - from) / 60_000;

function moonWords({ moonUp, moonLit, isMoonWaxing, start, end }: NightSky): string {
  if (moonUp.length === 0) return 'down all night';
  const lit = `${Math.round(moonLit * 100)} %, ${isMoonWaxing ? 'waxing' : 'waning'}`;
  const times = moonUp.map((up) => {
    if (up.start <= start && up.end >= end) return 'up all night';
    if (up.start <= start) return `up until ${formatMinutes(up.end)}`;
    return up.end >= end
      ? `up from ${formatMinutes(up.start)}`
      : `up ${formatMinutes(up.start)} to ${formatMinutes(up.end)}`;
  });
  return `${times.join(' and ')}, ${lit}`;
}

/** Sun and Moon of a night in words and UTC. */
export function nightFacts(sky: NightSky): readonly KeyValue[] {
  const { sunset, duskEnds, dawnBegins, sunrise, sunNote } = sky;
  const facts: KeyValue[] = [];
  if (sunset !== null) facts.push({ key: 'Sunset', value: formatMinutes(sunset), figure: true });
  if (duskEnds !== null) {
    facts.push({ key: 'Astronomical twilight ends', value: formatMinutes(duskEnds), figure: true });
  }
  if (dawnBegins !== null) {
    facts.push({ key: 'Astronomical twilight begins', value: formatMinutes(dawnBegins), figure: true });
  }
  if (sunrise !== null) facts.push({ key: 'Sunrise', value: formatMinutes(sunrise), figure: true });
  if (duskEnds !== null && dawnBegins !== null) {
    facts.push({
      key: 'Darkness',
      value: formatDuration(minutesBetween(duskEnds, dawnBegins)),
      figure: true,
    });
  }
  if (sunNote !== null) facts.push({ key: 'Sun', value: sunNote });
  facts.push({ key: 'Moon', value: moonWords(sky) });
  return facts;
}
