import { parentPort, workerData } from 'node:worker_threads';
import { transformTargets } from '@/lib/photometry/transform-targets';
import type { TransformMessage, TransformOrder } from './transform-targets/messages';
import { writeStars } from './transform-targets/star-rows';

const { order } = workerData as { readonly order: TransformOrder };
const stars = transformTargets(order.measurements, order.calibrations, order.options);
const message: TransformMessage = { kind: 'end', result: writeStars(order, stars) };
parentPort?.postMessage(message);
