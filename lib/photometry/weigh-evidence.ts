/**
 * What a solution says of a night, piece by piece and in words, and the verdict that follows. A person decides.
 *
 * | piece | for | with care | against |
 * |---|---|---|---|
 * | scatter √(σ₀² + σ_f²) per band | within its limit: that of B for U and B, that of V for V, R and I | above it | above the limit for not photometric |
 * | share of observations rejected by the fit | up to 10 % | up to 30 % | more |
 * | drift | below the limit in its standard errors | from there on | |
 * | runs of residuals in time | deviate above −3 | below | |
 * | extinction against the site's history | within 3 standard deviations | beyond | |
 * | coverage in airmass, colour and time | targets' airmass and time within the standards' | outside | |
 * | frames or runs of frames rejected | none | some | |
 * | a band that is not determined | | some | all |
 *
 * Against outweighs care, care outweighs for. Limits that the observatory does not edit are our own rules.
 *
 * Source: limits of scatter and drift: common practice, no source.
 */
import { bandOrder, type BandName } from './bands';
import { colourIndexWords, counted, figure, listed, sentence } from './finding-words';
import type {
  EvidenceItem,
  ExtinctionHistory,
  NightEvidence,
  Verdict,
  VerdictLimits,
} from './night-evidence';
import type { BandSolution, NightSolution, Range } from './night-solution';

export interface EvidenceContext {
  /** Place of the night in the solution. */
  readonly night: number;
  readonly limits: VerdictLimits;
  readonly history: ExtinctionHistory;
  /** Airmass and time [h from the mean time of the standards] of the night's targets; null without any. */
  readonly targets: { readonly airmass: Range; readonly hours: Range } | null;
}

const someRejected = 0.1;
const mostRejected = 0.3;
const fewestRuns = -3;
const oddExtinction = 3;
/** Nights from which a history says something. */
const shortestHistory = 3;
/**
 * What targets may lie outside the standards before it speaks for care [airmass] and [h]. The flags of the magnitudes tell
 * every step outside; the night is judged by those that matter: 0.2 airmass times a usual error of the extinction, 0.005,
 * is 0.001 mag.
 */
const airmassMargin = 0.2;
const hoursMargin = 0.5;

/** Weighs the evidence on one night.
 * @param solution - of the night, or of several
 * @param context - which night, limits, history and targets
 * @returns pieces of evidence in words, and the verdict that they suggest
 * @accuracy rounding
 * @source see the head */
export function weighEvidence(solution: NightSolution, context: EvidenceContext): NightEvidence {
  const all = solution.bands
    .filter(({ night }) => night === context.night)
    .sort((a, b) => bandOrder.indexOf(a.band) - bandOrder.indexOf(b.band));
  const bands = all.filter(({ outcome }) => outcome === 'determined');
  const items = [
    ...undetermined(all, bands.length),
    ...scatter(bands, context.limits),
    ...rejected(bands),
    ...structures(solution, context.night),
    ...drift(bands, context.limits),
    ...runs(bands),
    ...extinction(bands, context.history),
    ...coverage(bands, context),
  ];
  return { items, suggested: verdictOf(items) };
}

function verdictOf(items: readonly EvidenceItem[]): Verdict {
  if (items.some(({ speaks }) => speaks === 'against')) return 'not photometric';
  return items.some(({ speaks }) => speaks === 'care') ? 'usable with care' : 'photometric';
}

const item = (
  speaks: EvidenceItem['speaks'],
  kind: EvidenceItem['kind'],
  band: BandName | null,
  words: string,
): EvidenceItem => ({ speaks, kind, band, words: sentence(words) });

const names = (bands: readonly BandSolution[]): string => listed(bands.map(({ band }) => band));

function undetermined(all: readonly BandSolution[], nDetermined: number): EvidenceItem[] {
  const lost = all.filter(({ outcome }) => outcome === 'undetermined');
  if (lost.length === 0) return [];
  if (nDetermined > 0) {
    const words = `${names(lost)} could not be determined; the verdict rests on the other ${counted(nDetermined, 'band')}.`;
    return [item('care', 'undetermined', null, words)];
  }
  return [item('against', 'undetermined', null, 'No band could be determined.')];
}

const limitOf = (band: BandName, limits: VerdictLimits): number =>
  band === 'U' || band === 'B' ? limits.scatterB : limits.scatterV;

function scatter(bands: readonly BandSolution[], limits: VerdictLimits): EvidenceItem[] {
  const found = bands.map((band) => ({
    band: band.band,
    value: Math.hypot(band.scatter.observation ?? 0, band.scatter.frame ?? 0),
    limit: limitOf(band.band, limits),
  }));
  const items: EvidenceItem[] = [];
  const good = found.filter(({ value, limit }) => value <= limit);
  if (good.length > 0) {
    const parts = good.map(({ band, value }, k) => `${figure(value, 3)}${k === 0 ? ' mag' : ''} in ${band}`);
    const same = new Set(good.map(({ limit }) => limit)).size === 1;
    const within = listed(good.map(({ limit }) => String(limit)));
    items.push(
      item('for', 'scatter', null, `scatter ${listed(parts)}: within ${same ? good[0]!.limit : within}.`),
    );
  }
  for (const { band, value, limit } of found) {
    if (value <= limit) continue;
    const isBad = value > limits.notPhotometric;
    const words = isBad
      ? `scatter ${figure(value, 3)} mag in ${band}: above ${limits.notPhotometric}, where a night counts as not photometric.`
      : `scatter ${figure(value, 3)} mag in ${band}: above ${limit}, the limit of a photometric night.`;
    items.push(item(isBad ? 'against' : 'care', 'scatter', band, words));
  }
  return items;
}

function rejected(bands: readonly BandSolution[]): EvidenceItem[] {
  const whole = bands.filter(({ nRejected }) => nRejected === 0);
  const parts = whole.map(
    ({ band, nUsed }, k) => `${k === 0 ? counted(nUsed, 'observation') : nUsed} in ${band}`,
  );
  const all = whole.length === 0 ? [] : [item('for', 'rejected', null, `all ${listed(parts)} are used.`)];
  const some = bands.flatMap(({ band, nRejected, nUsed }) => {
    if (nRejected === 0) return [];
    const n = nRejected + nUsed;
    const share = nRejected / n;
    const speaks = share > mostRejected ? 'against' : share > someRejected ? 'care' : 'for';
    const words = `${nRejected} of ${counted(n, 'observation')} in ${band} ${nRejected === 1 ? 'is' : 'are'} not used (${(100 * share).toFixed(share < 0.01 ? 1 : 0)} %).`;
    return [item(speaks, 'rejected', band, words)];
  });
  return [...all, ...some];
}

function structures({ findings }: NightSolution, night: number): EvidenceItem[] {
  return findings.flatMap((finding) =>
    finding.night === night && (finding.kind === 'run-rejected' || finding.kind === 'frame-rejected')
      ? [item('care', 'structure', finding.band, finding.reason)]
      : [],
  );
}

function drift(bands: readonly BandSolution[], { driftSigma }: VerdictLimits): EvidenceItem[] {
  const tested = bands.flatMap(({ band, driftTest, hours }) =>
    driftTest === null || driftTest.error === 0
      ? []
      : [{ band, ...driftTest, hours, sigmas: Math.abs(driftTest.value) / driftTest.error }],
  );
  const figures = ({ value, error }: { readonly value: number; readonly error: number }): string =>
    `${figure(value, 4)} ± ${figure(error, 4)}`;
  const quiet = tested.filter(({ sigmas }) => sigmas < driftSigma);
  const parts = quiet.map((one, k) => `${figures(one)}${k === 0 ? ' mag per hour' : ''} in ${one.band}`);
  const none =
    quiet.length === 0 ? [] : [item('for', 'drift', null, `no significant drift: ${listed(parts)}.`)];
  const some = tested.flatMap(({ band, hours, sigmas, ...one }) => {
    if (sigmas < driftSigma) return [];
    const length = hours === null ? 0 : hours.max - hours.min;
    const words = `the zero point in ${band} drifts by ${figures(one)} mag per hour, ${figure(sigmas, 1)} standard errors: ${Math.abs(one.value * length).toFixed(3)} mag over the ${figure(length, 1)} hours of the standards.`;
    return [item('care', 'drift', band, words)];
  });
  return [...none, ...some];
}

function runs(bands: readonly BandSolution[]): EvidenceItem[] {
  return bands.flatMap(({ band, runsTest }) => {
    if (runsTest === null || runsTest >= fewestRuns) return [];
    const words = `residuals in ${band} keep their sign from frame to frame more often than chance would (deviate ${figure(runsTest, 1)}): something changed slowly.`;
    return [item('care', 'runs', band, words)];
  });
}

function extinction(bands: readonly BandSolution[], history: ExtinctionHistory): EvidenceItem[] {
  return bands.flatMap(({ band, coefficients }) => {
    const past = history[band];
    const found = coefficients.find(({ name }) => name === 'extinction');
    if (past === undefined || past.n < shortestHistory || found === undefined) return [];
    if (found.value === null || found.error === null || found.term.status === 'fixed') return [];
    const expected = Math.hypot(past.scatter, found.error);
    const sigmas = expected > 0 ? (found.value - past.mean) / expected : 0;
    const isOdd = Math.abs(sigmas) > oddExtinction;
    const words = `extinction ${figure(found.value, 3)} in ${band}: ${Math.abs(sigmas).toFixed(1)} standard deviations ${sigmas < 0 ? 'below' : 'above'} the site’s mean of ${figure(past.mean, 3)} over ${counted(past.n, 'night')}.`;
    return [item(isOdd ? 'care' : 'for', 'extinction', band, words)];
  });
}

const rangeWords = ({ min, max }: Range, digits: number): string =>
  `${figure(min, digits)} to ${figure(max, digits)}`;

function coverage(bands: readonly BandSolution[], { targets }: EvidenceContext): EvidenceItem[] {
  return bands.flatMap(({ band, airmass, colour, hours }) => {
    if (airmass === null || hours === null) return [];
    const colours = colour === null ? '' : `, ${colourIndexWords(band)} ${rangeWords(colour, 2)}`;
    const covered = `standards in ${band} cover airmass ${rangeWords(airmass, 2)}${colours} and ${(hours.max - hours.min).toFixed(1)} hours`;
    const outside =
      targets === null
        ? []
        : [
            ...(isWithin(targets.airmass, airmass, airmassMargin)
              ? []
              : [`are at airmass ${rangeWords(targets.airmass, 2)}`]),
            ...(isWithin(targets.hours, hours, hoursMargin)
              ? []
              : [`were taken ${beyondWords(targets.hours, hours)}`]),
          ];
    return outside.length === 0
      ? [item('for', 'coverage', band, `${covered}.`)]
      : [item('care', 'coverage', band, `${covered}, but targets ${listed(outside)}.`)];
  });
}

const isWithin = (inner: Range, outer: Range, margin: number): boolean =>
  inner.min >= outer.min - margin && inner.max <= outer.max + margin;

function beyondWords(targets: Range, standards: Range): string {
  const before = standards.min - targets.min;
  const after = targets.max - standards.max;
  return listed([
    ...(before > hoursMargin ? [`up to ${figure(before, 1)} hours before the first standard`] : []),
    ...(after > hoursMargin ? [`up to ${figure(after, 1)} hours after the last`] : []),
  ]);
}
