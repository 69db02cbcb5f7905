import { describe, expect, it } from 'vitest';
import { analyseLoop } from '../../lib/control/margins';
import { idealController, type Plant } from '../../lib/control/types';
import { checkLoop, type Engine } from '../../lib/sim/check';
import { automaticHorizon } from '../../lib/sim/horizon';
import { trySimulateOde } from '../../lib/sim/ode';

const plant = (num: number[], den: number[], deadTimeS = 0): Plant => ({ num, den, deadTimeS });
const secondEngine: Engine = (p, controller, options) => {
  const solved = trySimulateOde(p, controller, options);
  return solved.ok ? solved.value : null;
};
const loop = plant([2], [10, 1], 1);
const pid = idealController({ kp: 3, ti: 4, td: 0.4 });

describe('checkLoop', () => {
  it('states margins only of an unstable loop', () => {
    const check = checkLoop(plant([1], [1, 1], 1), idealController({ kp: 50 }), { secondEngine });
    expect([check.stable, check.setpoint, check.load, check.engines]).toEqual([false, null, null, null]);
    // Some factor below 1 would make it stable.
    expect(check.margins.gainMarginLow).toBeGreaterThan(0);
    expect(check.margins.gainMarginLow).toBeLessThan(1);
  });

  it('compares two engines on the same grid', () => {
    for (const options of [
      {},
      { actuator: { low: -1, high: 2 } },
      { sampleTimeS: 0.3 },
      { actuator: { low: -1, high: 2, trackingTimeS: 2 }, sampleTimeS: 0.3 },
    ]) {
      const { engines, warnings, setpoint } = checkLoop(loop, pid, { ...options, secondEngine, points: 301 });
      expect(engines?.engines).toEqual(['exact', 'ode']);
      expect(engines?.agreement).toBeLessThan(1e-5);
      expect(warnings).toEqual([]);
      expect(setpoint?.t.length).toBe(301);
    }
  });

  it('says when the engines differ, and when the second one gave up', () => {
    const off: Engine = (p, controller, options) => {
      const { setpoint, load } = checkLoop(p, controller, options);
      if (!setpoint || !load) return null;
      return { setpoint, load: { ...load, y: load.y.map((y) => 1.001 * y) } };
    };
    const { engines, warnings } = checkLoop(loop, pid, { secondEngine: off });
    expect(engines?.agreement).toBeCloseTo(1e-3, 5);
    expect(warnings.join()).toMatch(/differ by more than 1\/10000/);
    const alone = checkLoop(loop, pid, { secondEngine: () => null });
    expect(alone.engines).toBeNull();
    expect(alone.setpoint).not.toBeNull();
    expect(alone.warnings.join()).toMatch(/second engine could not follow/);
  });

  it('follows limits without a second engine', () => {
    const { setpoint, warnings } = checkLoop(loop, pid, { actuator: { low: -1, high: 1.5 } });
    expect(setpoint?.controlPeak).toBe(1.5);
    expect(warnings).toEqual([]);
  });

  it('leaves a limit on the rate of change to the second engine', () => {
    const actuator = { slew: 0.5 };
    expect(checkLoop(loop, pid, { actuator }).warnings.join()).toMatch(/left out of this preview/);
    const { engines, setpoint, warnings } = checkLoop(loop, pid, { actuator, secondEngine });
    expect(engines).toBeNull();
    expect(setpoint?.u[0]).toBeCloseTo(0, 12);
    expect(warnings.join()).toMatch(/one engine alone/);
  });

  it('an unstable plant that its limits cannot hold has no responses, and says why', () => {
    // Load 1 against at most 0.5: y runs away.
    const check = checkLoop(plant([1], [1, -1]), idealController({ kp: 4, ti: 3 }), {
      actuator: { low: -0.5, high: 0.5 },
    });
    expect([check.stable, check.setpoint, check.load]).toEqual([true, null, null]);
    expect(check.warnings.join()).toMatch(/grows without bound/);
  });

  it('takes the horizon it is given', () => {
    const { setpoint, load } = checkLoop(loop, pid, { horizonS: 12.5 });
    expect([setpoint?.horizonS, load?.horizonS, load?.t[599]]).toEqual([12.5, 12.5, 12.5]);
  });

  it('a dead time of a millionth of the horizon is followed', () => {
    const check = checkLoop(plant([1], [10, 1], 1e-5), idealController({ kp: 2, ti: 8 }));
    expect(check.warnings).toEqual([]);
    // As without dead time: 20/21·… closed loop (2s·8 + 2)/(80s² + 24s + 2).
    expect(check.setpoint?.overshootPct).toBeCloseTo(
      checkLoop(plant([1], [10, 1]), idealController({ kp: 2, ti: 8 })).setpoint?.overshootPct ?? NaN,
      3,
    );
  });
});

describe('automaticHorizon', () => {
  const horizonOf = (p: Plant, gains: Parameters<typeof idealController>[0]) => {
    const controller = idealController(gains);
    return automaticHorizon(p, controller, analyseLoop(p, controller).margins);
  };

  it('leaves the last fifth within 0.5 %, and not much more', () => {
    // First order, T = 2: at rest from 2·ln 200 = 10.6 s on, so 13.2 s or a little more.
    const { horizonS, settled } = horizonOf(plant([1], [4, 1]), { kp: 1 });
    expect(settled).toBe(true);
    expect(horizonS).toBeGreaterThanOrEqual((2 * Math.log(200)) / 0.8);
    expect(horizonS).toBeLessThanOrEqual(16);
  });

  it('is at least four dead times', () => {
    expect(horizonOf(plant([1], [1, 1], 10), { kp: 0.01 }).horizonS).toBeGreaterThanOrEqual(40);
  });

  it('follows a loop that rings for hundreds of cycles', () => {
    // (s+1)³ + kp with kp close to 8 rings at √3 rad/s and dies away at about (8 − kp)/24 1/s.
    const { horizonS, settled } = horizonOf(plant([1], [1, 3, 3, 1]), { kp: 7.96 });
    expect(settled).toBe(true);
    expect(horizonS).toBeGreaterThan(3000);
  });

  it('scales with time', () => {
    for (const factor of [1e-6, 1e-3, 1e4]) {
      const { horizonS } = horizonOf(plant([1], [2 * factor, 1], factor), { kp: 0.8, ti: 2 * factor });
      expect(horizonS / factor).toBeCloseTo(horizonOf(plant([1], [2, 1], 1), { kp: 0.8, ti: 2 }).horizonS, 6);
    }
  });
});
