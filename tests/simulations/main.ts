/** `npm run campaign`: simulated nights against what their solutions say of their own errors. */
import { runCampaign, spoiltNight, usualNight } from './campaign';
import { pullRows, pullTable, type PullLimits } from './pull-table';

const firstSeed = 20_261_201;
const fewest = 500;

/** Asked of the engine; few frames give slightly wide, t-like tails. */
const clean: PullLimits = { mean: 0.12, smallestSd: 0.92, largestSd: 1.1 };
/** 10 % gross errors, a misidentified star and a cloudy visit in each night. */
const spoilt: PullLimits = { mean: 0.3, smallestSd: 0, largestSd: 1.25 };

function main(asked: string | undefined): number {
  const nights = asked === undefined ? fewest : Number(asked);
  if (!Number.isInteger(nights) || nights < 2) {
    console.error('npm run campaign -- NIGHTS, with a whole number of nights of 2 or more');
    return 2;
  }
  let isMet = true;
  for (const [title, recipe, limits] of [
    ['Clean nights', usualNight, clean],
    ['Spoilt nights', spoiltNight, spoilt],
  ] as const) {
    const begun_ms = performance.now();
    const result = runCampaign(nights, firstSeed, recipe);
    const rows = pullRows(result, limits);
    console.log(pullTable(`${title}: ${nights}`, rows, limits));
    const seconds = (performance.now() - begun_ms) / 1000;
    console.log(`not determined: ${result.undetermined}; ${seconds.toFixed(1)} s\n`);
    isMet &&= result.undetermined === 0 && rows.length > 0 && rows.every((row) => row.isMet);
  }
  console.log(isMet ? 'All limits are met.' : 'A limit is missed.');
  return isMet ? 0 : 1;
}

process.exit(main(process.argv[2]));
