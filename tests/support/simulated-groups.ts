import { createRandom, type Random } from '@/lib/numerics/random';
import { type JointGroup, type JointMixedModelInput } from '@/lib/numerics/joint-mixed-model';

export interface SimulatedShape {
  readonly groups: number;
  readonly blocks: number;
  readonly rowsPerBlock: number;
  readonly subjects: number;
  readonly tau: number;
  readonly observation: number;
  readonly block: number;
}

const normals = (random: Random, count: number, sigma: number): Float64Array =>
  Float64Array.from({ length: count }, () => sigma * random.normal());

/** Groups with two columns of their own (a constant and one that changes from block to block) and one shared, drawn from
 * the model itself. Each block sees a run of the subjects. */
export function simulateGroups(shape: SimulatedShape, seed: number): JointMixedModelInput {
  const random = createRandom(seed);
  const effects = normals(random, shape.subjects, shape.tau);
  const property = Float64Array.from({ length: shape.subjects }, () => 2 * random.uniform() - 0.3);
  const groups = Array.from({ length: shape.groups }, (): JointGroup => {
    const n = shape.blocks * shape.rowsPerBlock;
    const constant = 2.5 + 0.1 * random.normal();
    const slope = 0.15 + 0.02 * random.normal();
    const shifts = normals(random, shape.blocks, shape.block);
    const design = new Float64Array(2 * n).fill(1, 0, n);
    const sharedDesign = new Float64Array(n);
    const response = new Float64Array(n);
    const sigma = new Float64Array(n);
    const subject = new Int32Array(n);
    const block = new Int32Array(n);
    for (let b = 0; b < shape.blocks; b += 1) {
      const x = 1 + 1.2 * random.uniform();
      const first = Math.floor(random.uniform() * shape.subjects);
      for (let r = 0; r < shape.rowsPerBlock; r += 1) {
        const i = b * shape.rowsPerBlock + r;
        const s = (first + r) % shape.subjects;
        subject[i] = s;
        block[i] = b;
        sigma[i] = 0.003 + 0.01 * random.uniform();
        design[n + i] = x;
        sharedDesign[i] = property[s] ?? NaN;
        response[i] =
          constant +
          slope * x -
          0.05 * (property[s] ?? NaN) +
          (effects[s] ?? NaN) +
          (shifts[b] ?? NaN) +
          Math.hypot(sigma[i] ?? NaN, shape.observation) * random.normal();
      }
    }
    return {
      response,
      design,
      columns: 2,
      sharedDesign,
      sigma,
      subject,
      block,
      observationScatter: { kind: 'estimate' },
      blockScatter: { kind: 'estimate' },
      priors: [],
    };
  });
  return {
    groups,
    sharedColumns: 1,
    sharedPriors: [],
    subjectSigma: new Float64Array(shape.subjects).fill(shape.tau),
    refinements: 0,
  };
}
