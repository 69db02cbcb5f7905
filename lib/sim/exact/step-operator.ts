import { columnsOf, dot, slopeReading, type Propagator, type Reading, type StateSpace } from './state-space';

/**
 * One step of fixed length, n rows of one matrix: z₁ = [Φ | Γ | byConstant]·[z₀; w₀, h·ẇ₀, w₁, h·ẇ₁; one of the
 * constants], where w is a cubic over the step.
 */
export interface StepOperator {
  readonly stepS: number;
  /** Length in units of the base, a power of two; 0 for a step of odd length. */
  readonly units: number;
  readonly block: Float64Array;
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
  const { lengthS: stepS, block: raw } = propagator;
  if (!space.bw) return { stepS, units, block: raw, echo: null };
  const { n } = space;
  const { stride } = columnsOf(space);
  const block = new Float64Array(raw);
  const perStep = space.timeUnitS / stepS;
  for (let g = n; g < block.length; g += stride) {
    const first = raw[g + 1] * perStep;
    const second = 2 * raw[g + 2] * perStep ** 2;
    const third = 6 * raw[g + 3] * perStep ** 3;
    block[g] = raw[g] - 3 * second + 2 * third;
    block[g + 1] = first - 2 * second + third;
    block[g + 2] = 3 * second - 2 * third;
    block[g + 3] = third - second;
  }
  const inside = deadTimeS > 0 && stepS > deadTimeS * (1 + 1e-9);
  return { stepS, units, block, echo: inside ? echoWithin(space, block, stepS, deadTimeS) : null };
}

function echoWithin(
  space: StateSpace,
  block: Float64Array,
  stepS: number,
  deadTimeS: number,
): EchoWithinStep {
  const { n, v: u } = space;
  const { stride } = columnsOf(space);
  const slope = slopeReading(space, u);
  const x = 1 - deadTimeS / stepS;
  const [x2, x3] = [x * x, x * x * x];
  const start = Float64Array.of(2 * x3 - 3 * x2 + 1, x3 - 2 * x2 + x, 6 * x2 - 6 * x, 3 * x2 - 4 * x + 1);
  const end = Float64Array.of(3 * x2 - 2 * x3, x3 - x2, 6 * x - 6 * x2, 3 * x2 - 2 * x);
  // (u₁, h·u̇₁) for (w₁, h·ẇ₁): through the states at the end of the step, and directly.
  const column = (at: number) => Float64Array.from(u.z, (_, i) => block[i * stride + n + at]);
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
