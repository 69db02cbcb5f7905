import { describe, expect, it } from 'vitest';
import { idealController, type Plant } from '../../lib/control/types';
import { OdeRefused, simulateOde, trySimulateOde } from '../../lib/sim/ode';
import { simulateExact } from '../../lib/sim/exact';

const plant = (num: number[], den: number[], deadTimeS = 0): Plant => ({ num, den, deadTimeS });

describe('simulateOde', () => {
  it('agrees with the exact engine on the six benchmark loops to 1e-5 of the peak', () => {
    const loops: [Plant, Parameters<typeof idealController>[0], number][] = [
      [plant([1], [0.4, 1.4, 1]), { kp: 6, ti: 1.2, td: 0.25, b: 0.7 }, 7.7],
      [plant([1], [1, 1], 0.3), { kp: 2, ti: 1, td: 0.1 }, 7.7],
      [plant([1], [1, 1], 2), { kp: 0.35, ti: 1.3, td: 0.35 }, 41],
      [plant([4], [1, 0.2, 4], 0.1), { kp: 0.5, ti: 0.8, td: 1 }, 23],
      [plant([1], [1, 8, 28, 56, 70, 56, 28, 8, 1]), { kp: 0.9, ti: 5.5, td: 1.7 }, 83],
      [plant([1], [1, 1, 0], 0.5), { kp: 0.9, ti: 6, td: 0.85, b: 0.6 }, 37],
    ];
    for (const [p, gains, horizonS] of loops) {
      const controller = idealController(gains);
      const ode = simulateOde(p, controller, { horizonS, points: 2000 });
      const exact = simulateExact(p, controller, { horizonS, points: 2000 });
      for (const kind of ['setpoint', 'load'] as const) {
        const peak = Math.max(...exact[kind].y.map(Math.abs));
        const worst = Math.max(...exact[kind].y.map((y, i) => Math.abs(y - ode[kind].y[i])));
        expect(worst / peak).toBeLessThan(1e-5);
      }
    }
  });

  it('hands back curves on a uniform grid from 0 to the horizon', () => {
    const { setpoint, load } = simulateOde(plant([2], [5, 1]), idealController({ kp: 3 }), {
      horizonS: 5,
      points: 11,
    });
    expect(Array.from(setpoint.t)).toEqual([0, 0.5, 1, 1.5, 2, 2.5, 3, 3.5, 4, 4.5, 5]);
    expect(load.y.length).toBe(11);
    expect(setpoint.u[0]).toBeCloseTo(3, 12);
  });

  it('gives a small response the same relative accuracy as a large one', () => {
    // P with loop gain 0.001: y(∞) = 0.001/1.001.
    const { setpoint } = simulateOde(plant([1], [1, 1]), idealController({ kp: 1e-3 }), { horizonS: 30 });
    expect(setpoint.y[setpoint.y.length - 1] / (0.001 / 1.001)).toBeCloseTo(1, 7);
  });

  it('states the final value of a response that stays at a limit', () => {
    // Static gain 2, limit 0.3: y comes to rest at 0.6, the error integral runs on.
    const limited = simulateOde(plant([2], [3, 1]), idealController({ kp: 1, ti: 2 }), {
      horizonS: 40,
      actuator: { low: -0.3, high: 0.3 },
    });
    expect(limited.setpoint.final).toBeCloseTo(0.6, 12);
    expect(limited.setpoint.y[599]).toBeCloseTo(0.6, 4);
    // The load of 1 is met by −0.3 only: 2·0.7.
    expect(limited.load.final).toBeCloseTo(1.4, 12);
    // An integrating plant cannot be held against it and runs away.
    const integrating = simulateOde(plant([1], [1, 0]), idealController({ kp: 1, ti: 2 }), {
      horizonS: 10,
      actuator: { low: -0.3, high: 0.3 },
    });
    expect(integrating.load.final).toBe(Infinity);
    expect(integrating.load.recoveryTimeS).toBeNull();
  });

  it('copes with a derivative filter 30,000 times shorter than the horizon', () => {
    const controller = idealController({ kp: 6, ti: 1.2, td: 0.25, n: 100 });
    const ode = simulateOde(plant([1], [0.4, 1.4, 1]), controller, { horizonS: 77 });
    const exact = simulateExact(plant([1], [0.4, 1.4, 1]), controller, { horizonS: 77 });
    expect(ode.setpoint.totalVariation / exact.setpoint.totalVariation).toBeCloseTo(1, 5);
    expect(ode.load.iae / exact.load.iae).toBeCloseTo(1, 5);
  });

  it('refuses an unstable loop with a code', () => {
    const unstable = [plant([1], [1, 3, 3, 1]), idealController({ kp: 40 })] as const;
    const tried = trySimulateOde(...unstable, { horizonS: 200 });
    expect(!tried.ok && tried.code).toBe('ODE_DIVERGED');
    expect(() => simulateOde(...unstable, { horizonS: 200 })).toThrow(OdeRefused);
  });

  it('says which value is out of range', () => {
    const run =
      (options: Parameters<typeof simulateOde>[2], kp = 1) =>
      () =>
        simulateOde(plant([1], [1, 1]), idealController({ kp }), options);
    expect(run({ horizonS: 0 })).toThrow(/horizonS/);
    expect(run({ horizonS: 1, points: 1 })).toThrow(/points/);
    expect(run({ horizonS: 1, sampleTimeS: -1 })).toThrow(/sampleTimeS/);
    expect(run({ horizonS: 1, actuator: { low: 1, high: 0 } })).toThrow(/actuator.low/);
    expect(run({ horizonS: 1 }, 0)).toThrow(/kp/);
    expect(() => simulateOde(plant([1, 0, 0], [1, 1]), idealController({ kp: 1 }), { horizonS: 1 })).toThrow(
      /degree/,
    );
  });
});
