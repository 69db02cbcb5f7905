/** A signal read off a system: Σ z[i]·zᵢ + w·w + ones[k], k the constant input in use. */
export interface Reading {
  readonly z: Float64Array;
  readonly w: number;
  readonly ones: readonly number[];
}

/**
 * What a run steps through: ż = A z + bw·w + e in units of timeUnitS, with the signals read off it. w is what reaches
 * the plant after the dead time; e is one of several constant inputs (set-point, load, an output at its limit).
 */
export interface StateSpace {
  readonly n: number;
  readonly timeUnitS: number;
  readonly a: Float64Array;
  /** Null where w plays no part. */
  readonly bw: Float64Array | null;
  readonly constants: readonly Float64Array[];
  readonly y: Reading;
  /** The controller output before its limits; of a plant without controller, the filtered measurement. */
  readonly v: Reading;
}

/** Derivatives of w in a propagator: w, ẇ, ẅ and the third. */
export const POWERS = 4;

/**
 * A system over a fixed time, n rows of one matrix: z₁ = [Φ | byInput | byConstant]·[z₀; w, ẇ, ẅ, w⃛ at the start per
 * time unit; one of the constants].
 */
export interface Propagator {
  readonly lengthS: number;
  readonly block: Float64Array;
}

/** Columns of a propagator: n for the states, then those of w (none where it plays no part), then the constants. */
export function columnsOf({ n, bw, constants }: StateSpace): { powers: number; stride: number } {
  const powers = bw ? POWERS : 0;
  return { powers, stride: n + powers + constants.length };
}

export function dot(a: Float64Array, b: Float64Array): number {
  let sum = 0;
  for (let i = 0; i < a.length; i += 1) sum += a[i] * b[i];
  return sum;
}

/** The slope per second of a signal, as far as states, w and constants make it; a change of w itself comes on top. */
export function slopeReading(space: StateSpace, signal: Reading): Reading {
  const { n, a, bw, constants, timeUnitS } = space;
  const z = new Float64Array(n);
  for (let i = 0; i < n; i += 1) {
    const factor = signal.z[i] / timeUnitS;
    if (factor !== 0) for (let j = 0; j < n; j += 1) z[j] += factor * a[i * n + j];
  }
  return {
    z,
    w: bw ? dot(signal.z, bw) / timeUnitS : 0,
    ones: constants.map((e) => dot(signal.z, e) / timeUnitS),
  };
}
