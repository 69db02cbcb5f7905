import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { analyseLoop } from '../../lib/control/margins';
import { idealController, type IdealController, type Plant } from '../../lib/control/types';
import { simulateExact } from '../../lib/sim/exact';
import { automaticHorizon } from '../../lib/sim/horizon';
import { controllerOf, plantOf, referenceLoops } from '../support/reference-loops';

/**
 * ∫y dt after a unit load step is ti/kp for every stable loop with integral action, whatever the plant: the integral
 * term has to end at the load it cancels. From memory of K. J. Åström and T. Hägglund, PID Controllers: Theory, Design
 * and Tuning (ISA, 1995), where the integrated error after a load step is IE = Ti/K; it also follows from the closed
 * loop at s = 0 in one line.
 */
const POINTS = 20_001;
const DOUBLINGS = 5;
/** Close to the limit thousands of cycles pass, too many for POINTS points. */
const LARGEST_MS = 4;
/** What the second half of the response may still hold, ∫|y| there as a share of the whole. */
const TAIL = 5e-5;
/** The accuracy asked of the integrals of a response; the trapezoidal rule over POINTS points stays well within it. */
const TOLERANCE = 1e-4;

/** Trapezoidal rule over part of a curve on a uniform grid. */
function trapezoid(y: Float64Array, step: number, from: number, to: number): number {
  let sum = 0.5 * (y[from] + y[to]);
  for (let i = from + 1; i < to; i += 1) sum += y[i];
  return sum * step;
}

/** ∫y over a response long enough for its second half to add nothing; null where none of the lengths is. */
function loadIntegral(plant: Plant, controller: IdealController): number | null {
  const { margins } = analyseLoop(plant, controller);
  let { horizonS } = automaticHorizon(plant, controller, margins);
  for (let i = 0; i < DOUBLINGS; i += 1) {
    const { y } = simulateExact(plant, controller, { horizonS, points: POINTS }).load;
    const step = horizonS / (POINTS - 1);
    const middle = (POINTS - 1) / 2;
    const whole = trapezoid(y, step, 0, POINTS - 1);
    const rest = trapezoid(y.map(Math.abs), step, middle, POINTS - 1);
    if (rest < TAIL * Math.abs(whole)) return whole;
    horizonS *= 2;
  }
  return null;
}

const decades = (from: number, to: number) =>
  fc.double({ min: from, max: to, noNaN: true }).map((exponent) => 10 ** exponent);

/** Lags, some with a zero on either side or an integrator, with and without dead time; gain of either sign. */
const plants: fc.Arbitrary<Plant> = fc
  .record({
    lags: fc.array(decades(-1, 1), { minLength: 1, maxLength: 4 }),
    zero: fc.oneof(fc.constant(0), decades(-1, 0)),
    zeroSide: fc.constantFrom(1, -1),
    integrating: fc.boolean(),
    gain: decades(-2, 2),
    sign: fc.constantFrom(1, -1),
    deadTimeS: fc.oneof(fc.constant(0), decades(-2, 1)),
  })
  .map(({ lags, zero, zeroSide, integrating, gain, sign, deadTimeS }) => {
    const times = (p: number[], factor: number[]) =>
      factor.reduce<number[]>(
        (sum, f, i) => p.reduce((s, c, j) => ((s[i + j] = (s[i + j] ?? 0) + f * c), s), sum),
        [],
      );
    const den = lags.reduce<number[]>((p, lag) => times(p, [lag, 1]), integrating ? [1, 0] : [1]);
    const k = sign * gain;
    return { num: lags.length > 1 && zero !== 0 ? [k * zeroSide * zero, k] : [k], den, deadTimeS };
  });

/** Gains around 1 of the plant's static gain, integral and derivative times around its lags; with and without filter. */
const settings = fc.record({
  loopGain: decades(-1.5, 0.5),
  ti: decades(-0.5, 1.5),
  td: fc.oneof(fc.constant(0), decades(-1, 0)),
  n: fc.double({ min: 2, max: 20, noNaN: true }),
  filter: fc.constantFrom(undefined, 1 as const, 2 as const),
});

describe('∫y after a unit load step is ti/kp', () => {
  for (const loop of referenceLoops('loops-open.json')) {
    const controller = controllerOf(loop);
    // Behind a dead time y jumps with its input where the plant is biproper; the rule is off by a step at each jump.
    const jumps = loop.plant.delay > 0 && loop.plant.num.length === loop.plant.den.length;
    if (!loop.expect.stable || !Number.isFinite(controller.ti) || jumps) continue;
    it(loop.id, () => {
      const integral = loadIntegral(plantOf(loop), controller);
      expect(Math.abs(((integral ?? 0) * controller.kp) / controller.ti - 1)).toBeLessThan(TOLERANCE);
    });
  }

  it('holds for any stable loop of lags, zeros, integrators and dead time', () => {
    fc.assert(
      fc.property(plants, settings, (plant, { loopGain, ti, td, n, filter }) => {
        const controller = idealController({
          kp: loopGain / plant.num[plant.num.length - 1],
          ti,
          td,
          n,
          ...(filter ? { filter: { timeConstantS: 0.05, order: filter } } : {}),
        });
        const { stable, margins } = analyseLoop(plant, controller);
        fc.pre(stable && (margins.ms ?? Infinity) <= LARGEST_MS);
        const integral = loadIntegral(plant, controller);
        fc.pre(integral !== null);
        expect(Math.abs(((integral ?? 0) * controller.kp) / ti - 1)).toBeLessThan(TOLERANCE);
      }),
      { numRuns: 100, seed: 1995, maxSkipsPerRun: 50, endOnFailure: true },
    );
  });
});
