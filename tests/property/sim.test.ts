import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { multiply } from '../../lib/control/polynomial';
import { analyseLoop } from '../../lib/control/margins';
import { idealController, type IdealController, type Plant } from '../../lib/control/types';
import { checkLoop } from '../../lib/sim/check';
import { simulateExact } from '../../lib/sim/exact';
import { responsesOf } from '../../lib/sim/exact/responses';
import type { Trajectory } from '../../lib/sim/metrics';

/** Laws that hold for every loop, over loops drawn at random. */
const lag = fc.double({ min: 0.05, max: 5, noNaN: true });
const plants: fc.Arbitrary<Plant> = fc
  .record({
    gain: fc.double({ min: 0.2, max: 5, noNaN: true }),
    lags: fc.array(lag, { minLength: 1, maxLength: 5 }),
    integrating: fc.boolean(),
    deadTimeS: fc.oneof(fc.constant(0), fc.double({ min: 0.001, max: 3, noNaN: true })),
  })
  .map(({ gain, lags, integrating, deadTimeS }) => ({
    num: [gain],
    den: lags.reduce((den, t) => multiply(den, [t, 1]), integrating ? [1, 0] : [1]),
    deadTimeS,
  }));
const controllers: fc.Arbitrary<IdealController> = fc
  .record({
    kp: fc.double({ min: 0.05, max: 3, noNaN: true }),
    ti: fc.double({ min: 0.5, max: 10, noNaN: true }),
    td: fc.oneof(fc.constant(0), fc.double({ min: 0.01, max: 0.5, noNaN: true })),
    n: fc.double({ min: 2, max: 50, noNaN: true }),
    b: fc.double({ min: 0, max: 1, noNaN: true }),
    c: fc.constantFrom(0, 1),
  })
  .map((values) => idealController(values));

/** ∫y over the whole of a trajectory: cubics, exactly. */
function integral({ t, y0, dy0, y1, dy1, count }: Trajectory): number {
  let sum = 0;
  for (let i = 0; i < count; i += 1) {
    const h = t[i + 1] - t[i];
    sum += (h * (y0[i] + y1[i])) / 2 + (h * h * (dy0[i] - dy1[i])) / 12;
  }
  return sum;
}

describe('every stable loop with integral action', () => {
  it('has ∫y = ti/kp after a unit load step, whatever the plant (common practice; from the final value theorem)', () => {
    let checked = 0;
    fc.assert(
      fc.property(plants, controllers, (plant, controller) => {
        const { stable, margins } = analyseLoop(plant, controller);
        // A loop near its limit rings too long for the tail to be left out.
        fc.pre(stable && margins.ms !== null && margins.ms < 4);
        checked += 1;
        const { load } = checkLoop(plant, controller);
        const response = responsesOf(plant, controller).upTo('load', 6 * (load?.horizonS ?? 0));
        expect(response.ok).toBe(true);
        if (!response.ok || !load) return;
        const difference = Math.abs(integral(response.value) - controller.ti / controller.kp);
        expect(difference).toBeLessThan(1e-4 * load.iae);
      }),
      { numRuns: 200, seed: 20 },
    );
    expect(checked).toBeGreaterThan(100);
  });
});

describe('every loop', () => {
  it('is checked without an exception, and with finite figures where it is stable', () => {
    fc.assert(
      fc.property(plants, controllers, (plant, controller) => {
        const { stable, setpoint, load } = checkLoop(plant, controller, { points: 50 });
        if (!stable) return;
        expect([setpoint?.iae, setpoint?.totalVariation, load?.peak].every(Number.isFinite)).toBe(true);
        expect(setpoint?.y.every(Number.isFinite)).toBe(true);
      }),
      { numRuns: 150, seed: 21 },
    );
  });

  it('with limits out of reach is the linear loop, and sampled fast enough is the continuous one', () => {
    fc.assert(
      fc.property(plants, controllers, (plant, controller) => {
        const { stable, margins } = analyseLoop(plant, controller);
        fc.pre(stable && margins.ms !== null && margins.ms < 2.5);
        const horizonS = 15;
        const free = simulateExact(plant, controller, { horizonS, points: 60 });
        const wide = simulateExact(plant, controller, {
          horizonS,
          points: 60,
          actuator: { low: -1e6, high: 1e6 },
        });
        const peak = Math.max(...free.setpoint.y.map(Math.abs));
        const differs = (other: typeof free) =>
          Math.max(...free.setpoint.y.map((y, i) => Math.abs(y - other.setpoint.y[i]))) / peak;
        expect(differs(wide)).toBeLessThan(1e-5);
        const sampled = (sampleTimeS: number) =>
          differs(simulateExact(plant, controller, { horizonS, points: 60, sampleTimeS }));
        // The error of sampling falls with the sample time.
        expect(sampled(0.0005)).toBeLessThan(Math.max(1e-4, 0.4 * sampled(0.002)));
      }),
      { numRuns: 25, seed: 22 },
    );
  });
});
