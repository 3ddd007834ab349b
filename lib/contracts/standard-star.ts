/** A published standard star. Magnitudes and errors [mag], null where not published. */
export interface StandardStar {
  readonly name: string;
  /** deg J2000 */
  readonly ra: number;
  readonly dec: number;
  /** mas per year; in right ascension times cos dec */
  readonly pmRa: number | null;
  readonly pmDec: number | null;
  readonly v: number;
  readonly bv: number;
  readonly ub: number | null;
  readonly vr: number | null;
  readonly ri: number | null;
  /** Where not published, the sum of V−R and R−I. */
  readonly vi: number | null;
  readonly eV: number | null;
  readonly eBv: number | null;
  readonly eUb: number | null;
  readonly eVr: number | null;
  readonly eRi: number | null;
  readonly eVi: number | null;
  readonly nObservations: number | null;
  readonly isUsable: boolean;
  readonly caution: string;
  readonly source: string;
  readonly defaultError: number;
}
