import type { Handlers } from './handler';

/** What does the work of each kind; loaded when the first job of the kind comes. */
export const handlers: Handlers = {
  'check-measurements': async () => (await import('./handlers/check-measurements')).checkMeasurements,
  'send-mail': async () => (await import('./handlers/send-mail')).sendMail,
  'solve-night': async () => (await import('./handlers/solve-night')).solveNight,
  'transform-targets': async () => (await import('./handlers/transform-targets')).transformTargets,
  tidy: async () => (await import('./handlers/tidy')).tidy,
};
