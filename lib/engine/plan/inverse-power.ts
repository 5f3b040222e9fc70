/**
 * A learning curve value(size) = asymptote − drop·size^(−rate). With drop 0 (`isFlat`) nothing was gained with size.
 */
export interface InversePower {
  asymptote: number;
  drop: number;
  rate: number;
  isFlat: boolean;
  /** Weighted root mean square of what the curve leaves. */
  residualSd: number;
}

/** The curve's value at a size > 0. Constant cost. */
export function inversePowerAt(curve: InversePower, size: number): number {
  return curve.isFlat ? curve.asymptote : curve.asymptote - curve.drop * size ** -curve.rate;
}
