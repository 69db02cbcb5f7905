import type { Matrix } from './matrix';
import { slopeReading, type StateSpace } from './state-space';

/** Where the input is a cubic over a step: columns for its value and slope·h at the start, the same at the end, and 1. */
export const COLUMNS = 5;

/** One step of fixed length: z₁ = Φ z₀ + Γ·(w₀, s₀, w₁, s₁, 1). */
export interface StepOperator {
  readonly stepS: number;
  readonly phi: Float64Array;
  readonly gamma: Float64Array;
  /** Present where the step is longer than the dead time: its end acts on the plant within the step itself. */
  readonly echo: EchoWithinStep | null;
}

/**
 * For a step longer than the dead time the input at its end is a place on the step's own cubic of u. That makes two
 * linear equations for (w₁, s₁), solved once per step length: (w₁, s₁) = m·(known part).
 */
export interface EchoWithinStep {
  /** Weights of (u₀, h·u̇₀) and of (u₁, h·u̇₁) in (w₁, s₁), two rows each. */
  readonly start: Float64Array;
  readonly end: Float64Array;
  readonly solve: Float64Array;
}

/** [A bw 0 0 0 e; shift; 0]: its exponential holds Φ and the exact response to any cubic input. */
export function augmented(space: StateSpace): { matrix: Matrix; size: number } {
  const { n, a, bw, e } = space;
  const size = n + COLUMNS;
  const matrix = new Float64Array(size * size);
  for (let i = 0; i < n; i += 1) {
    for (let j = 0; j < n; j += 1) matrix[i * size + j] = a[i * n + j];
    matrix[i * size + n] = bw[i];
    matrix[i * size + n + 4] = e[i];
  }
  for (let k = 0; k < 3; k += 1) matrix[(n + k) * size + n + k + 1] = 1;
  return { matrix, size };
}

/** Takes a step apart from the exponential of the augmented matrix; `deadTimeS` 0: the input is not used. */
export function stepOperator(
  space: StateSpace,
  full: Matrix,
  stepS: number,
  deadTimeS: number,
): StepOperator {
  const { n } = space;
  const size = n + COLUMNS;
  const phi = new Float64Array(n * n);
  const gamma = new Float64Array(n * COLUMNS);
  // From the derivatives of w at the start of the step to values and slopes at both ends.
  const perStep = space.timeUnitS / stepS;
  for (let i = 0; i < n; i += 1) {
    for (let j = 0; j < n; j += 1) phi[i * n + j] = full[i * size + j];
    const at = i * size + n;
    const first = full[at + 1] * perStep;
    const second = 2 * full[at + 2] * perStep ** 2;
    const third = 6 * full[at + 3] * perStep ** 3;
    const g = i * COLUMNS;
    gamma[g] = full[at] - 3 * second + 2 * third;
    gamma[g + 1] = first - 2 * second + third;
    gamma[g + 2] = 3 * second - 2 * third;
    gamma[g + 3] = third - second;
    gamma[g + 4] = full[at + 4];
  }
  const inside = deadTimeS > 0 && stepS > deadTimeS * (1 + 1e-9);
  return { stepS, phi, gamma, echo: inside ? echoWithin(space, gamma, stepS, deadTimeS) : null };
}

function echoWithin(
  space: StateSpace,
  gamma: Float64Array,
  stepS: number,
  deadTimeS: number,
): EchoWithinStep {
  const { n, u } = space;
  const x = 1 - deadTimeS / stepS;
  const [x2, x3] = [x * x, x * x * x];
  const start = Float64Array.of(2 * x3 - 3 * x2 + 1, x3 - 2 * x2 + x, 6 * x2 - 6 * x, 3 * x2 - 4 * x + 1);
  const end = Float64Array.of(3 * x2 - 2 * x3, x3 - x2, 6 * x - 6 * x2, 3 * x2 - 2 * x);
  const slope = slopeReading(space, u);
  // (u₁, h·u̇₁) for (w₁, s₁): through the states at the end of the step, and directly.
  const through = [u.w, 0, stepS * slope.w, u.w];
  for (let i = 0; i < n; i += 1) {
    const [gw, gs] = [gamma[i * COLUMNS + 2], gamma[i * COLUMNS + 3]];
    through[0] += u.z[i] * gw;
    through[1] += u.z[i] * gs;
    through[2] += stepS * slope.z[i] * gw;
    through[3] += stepS * slope.z[i] * gs;
  }
  const a = 1 - end[0] * through[0] - end[1] * through[2];
  const b = -end[0] * through[1] - end[1] * through[3];
  const c = -end[2] * through[0] - end[3] * through[2];
  const d = 1 - end[2] * through[1] - end[3] * through[3];
  const determinant = a * d - b * c;
  const solve = Float64Array.of(d, -b, -c, a).map((value) => value / determinant);
  return { start, end, solve };
}
