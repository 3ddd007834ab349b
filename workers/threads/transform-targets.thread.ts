import { parentPort, workerData } from 'node:worker_threads';
import { transformTargets } from '@/lib/photometry/transform-targets';
import type { TransformMessage, TransformOrder } from './transform-targets/messages';
import { starAirmasses } from './transform-targets/star-airmasses';
import { writeStars } from './transform-targets/star-rows';

const { order } = workerData as { readonly order: TransformOrder };
const { airmass, nWithoutAirmass } = starAirmasses(order);
const stars = transformTargets({ ...order.measurements, airmass }, order.calibrations, order.options);
const message: TransformMessage = { kind: 'end', result: { ...writeStars(order, stars), nWithoutAirmass } };
parentPort?.postMessage(message);
