import { dot, POWERS, slopeReading, type Propagator, type Reading, type StateSpace } from './state-space';

/** One step of fixed length: z₁ = Φ z₀ + Γ·(w₀, h·ẇ₀, w₁, h·ẇ₁) + one, where w is a cubic over the step. */
export interface StepOperator {
  readonly stepS: number;
  /** Length in units of the base, a power of two; 0 for a step of odd length. */
  readonly units: number;
  readonly phi: Float64Array;
  /** n rows of 4 columns; null where w plays no part. */
  readonly gamma: Float64Array | null;
  /** One column for each constant input. */
  readonly ones: readonly Float64Array[];
  /** Present where the step is longer than the dead time. */
  readonly echo: EchoWithinStep | null;
}

/**
 * In a step longer than the dead time the input at its end is a place on the step's own cubic of u. That makes two
 * linear equations for (w₁, h·ẇ₁), solved once for each length.
 */
export interface EchoWithinStep {
  /** Weights of (u₀, h·u̇₀) and of (u₁, h·u̇₁) in (w₁, h·ẇ₁), two rows each. */
  readonly start: Float64Array;
  readonly end: Float64Array;
  /** (w₁, h·ẇ₁) = solve·(what is known without them). */
  readonly solve: Float64Array;
}

/** Takes a step from a propagator: from the derivatives of w at the start to values and slopes at both ends. */
export function stepOperator(
  space: StateSpace,
  propagator: Propagator,
  deadTimeS: number,
  units: number,
): StepOperator {
  const { lengthS: stepS, phi, byInput, byConstant: ones } = propagator;
  if (!byInput) return { stepS, units, phi, gamma: null, ones, echo: null };
  const gamma = new Float64Array(space.n * POWERS);
  const perStep = space.timeUnitS / stepS;
  for (let g = 0; g < gamma.length; g += POWERS) {
    const first = byInput[g + 1] * perStep;
    const second = 2 * byInput[g + 2] * perStep ** 2;
    const third = 6 * byInput[g + 3] * perStep ** 3;
    gamma[g] = byInput[g] - 3 * second + 2 * third;
    gamma[g + 1] = first - 2 * second + third;
    gamma[g + 2] = 3 * second - 2 * third;
    gamma[g + 3] = third - second;
  }
  const inside = deadTimeS > 0 && stepS > deadTimeS * (1 + 1e-9);
  return { stepS, units, phi, gamma, ones, echo: inside ? echoWithin(space, gamma, stepS, deadTimeS) : null };
}

function echoWithin(
  space: StateSpace,
  gamma: Float64Array,
  stepS: number,
  deadTimeS: number,
): EchoWithinStep {
  const { v: u } = space;
  const slope = slopeReading(space, u);
  const x = 1 - deadTimeS / stepS;
  const [x2, x3] = [x * x, x * x * x];
  const start = Float64Array.of(2 * x3 - 3 * x2 + 1, x3 - 2 * x2 + x, 6 * x2 - 6 * x, 3 * x2 - 4 * x + 1);
  const end = Float64Array.of(3 * x2 - 2 * x3, x3 - x2, 6 * x - 6 * x2, 3 * x2 - 2 * x);
  // (u₁, h·u̇₁) for (w₁, h·ẇ₁): through the states at the end of the step, and directly.
  const column = (at: number) => Float64Array.from(u.z, (_, i) => gamma[i * POWERS + at]);
  const through = ({ z }: Reading, at: number) => dot(z, column(at));
  const u1 = [through(u, 2) + u.w, through(u, 3)];
  const slope1 = [stepS * (through(slope, 2) + slope.w), stepS * through(slope, 3) + u.w];
  const a = 1 - end[0] * u1[0] - end[1] * slope1[0];
  const b = -end[0] * u1[1] - end[1] * slope1[1];
  const c = -end[2] * u1[0] - end[3] * slope1[0];
  const d = 1 - end[2] * u1[1] - end[3] * slope1[1];
  const determinant = a * d - b * c;
  return { start, end, solve: Float64Array.of(d, -b, -c, a).map((value) => value / determinant) };
}
