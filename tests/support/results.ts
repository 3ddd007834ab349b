import { execute, insert } from '@/lib/server/data/database';
import { newPublicId } from '@/lib/server/data/public-id';
import type { PersonCaller } from '@/lib/server/policy/caller';
import { noInputs, usualModel } from './solution-json';

interface NewSolution {
  readonly night: string;
  readonly number: number;
  readonly state: 'draft' | 'proposed' | 'approved' | 'superseded' | 'withdrawn';
  readonly by: PersonCaller;
  readonly outcome?: 'determined' | 'undetermined' | null;
  readonly proposedBy?: PersonCaller;
  readonly approvedBy?: PersonCaller;
}

export interface MadeSolution {
  readonly id: number;
  readonly publicId: string;
}

/** A solution of a night as it would stand after the acts that lead to its state; without bands and observations. */
export async function newSolution(made: NewSolution): Promise<MadeSolution> {
  const publicId = newPublicId();
  const id = await insert(
    `INSERT INTO solutions
       (public_id, night_id, number, state, model, inputs, software_version, outcome, suggested_verdict, verdict,
        created_by_id, solved_at, proposed_by_id, proposed_at, approved_by_id, approved_at)
     SELECT :publicId, n.id, :number, :state, :model, :inputs, '1.0.0', :outcome,
            'photometric', IF(:proposer IS NULL, NULL, 'photometric'), :by, IF(:outcome IS NULL, NULL, NOW(3)),
            :proposer, IF(:proposer IS NULL, NULL, NOW(3)), :approver, IF(:approver IS NULL, NULL, NOW(3))
       FROM nights n WHERE n.public_id = :night`,
    {
      publicId,
      night: made.night,
      number: made.number,
      state: made.state,
      model: JSON.stringify(usualModel),
      inputs: JSON.stringify(noInputs),
      outcome: made.outcome === undefined ? 'determined' : made.outcome,
      by: made.by.personId,
      proposer: made.proposedBy?.personId ?? null,
      approver: made.approvedBy?.personId ?? null,
    },
    null,
  );
  return { id, publicId };
}

const madeWith = {
  assumedColour: { value: 0.65, error: 0.35 },
  lowSignal: 12,
  largeOffset: 0.09,
  nightWithCare: false,
};

interface NewResult {
  readonly solution: MadeSolution;
  readonly night: string;
  /** Internal id; null for targets of no programme. */
  readonly programme: number | null;
  readonly state?: 'queued' | 'done';
}

/** A transformation of a night's targets; returns its internal id. */
export async function newResult({ solution, night, programme, state = 'done' }: NewResult): Promise<number> {
  return insert(
    `INSERT INTO transformations (public_id, solution_id, night_id, programme_id, state, finished_at, options)
     SELECT :publicId, :solution, n.id, :programme, :state, IF(:state = 'done', NOW(3), NULL),
            IF(:state = 'done', :options, NULL)
       FROM nights n WHERE n.public_id = :night`,
    {
      publicId: newPublicId(),
      solution: solution.id,
      night,
      programme,
      state,
      options: JSON.stringify(madeWith),
    },
    null,
  );
}

interface NewStar {
  readonly no: number;
  readonly star: string;
  readonly v: number | null;
  readonly bv?: number | null;
  readonly random?: number;
  readonly flags?: number;
}

/** Stars of a result, 2 measurements in B and 3 in V each, with a systematic error of 0.004 mag. */
export async function addStars(result: number, stars: readonly NewStar[]): Promise<void> {
  for (const { no, star, v, bv = 0.5, random = 0.003, flags = 0 } of stars) {
    await execute(
      `INSERT INTO calibrated_magnitudes
         (transformation_id, star_no, star, ra, decl, n_b, n_v, v, v_random, v_systematic, bv, bv_random, bv_systematic,
          b, b_random, b_systematic, bjd_tdb, airmass, flags)
       VALUES (:result, :no, :star, 83.5, 22.1, 2, 3, :v, :random, 0.004, :bv, :random, 0.004,
               :v + :bv, :random, 0.004, 2461348.5, 1.2, :flags)`,
      { result, no, star, v, bv, random, flags },
      null,
    );
  }
}
