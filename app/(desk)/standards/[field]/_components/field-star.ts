/** A standard star as the page of its field shows it. Magnitudes [mag], null where not published. */
export interface FieldStar {
  readonly name: string;
  readonly ra: number;
  readonly dec: number;
  readonly pmRa: number | null;
  readonly pmDec: number | null;
  readonly v: number;
  readonly bv: number;
  readonly ub: number | null;
  readonly vr: number | null;
  readonly ri: number | null;
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
  /** From the middle of the chart [deg]. */
  readonly east: number;
  readonly north: number;
}
