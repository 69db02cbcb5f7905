import { describe, expect, it } from 'vitest';
import { idealController, type IdealController, type Plant } from '../../lib/control/types';
import { sampleAt } from '../support/sample-ode';
import { solveLoop, type OdeOptions } from '../../lib/sim/ode/solve-loop';

/** Every expectation here is a closed-form solution of the loop's equations, derived beside it. */
function respond(
  plant: Plant,
  controller: IdealController,
  step: 'setpoint' | 'load',
  options: OdeOptions,
  points = 400,
) {
  const solved = solveLoop(plant, controller, step, options);
  if (!solved.ok) throw new Error(solved.message);
  // Not exactly at the corners, where a closed form may take the other side.
  const t = Float64Array.from({ length: points }, (_, i) => ((i + 0.37) / points) * options.horizonS);
  return { t, ...sampleAt(solved.value, t) };
}

function expectCurve(t: Float64Array, y: Float64Array, want: (t: number) => number, tolerance = 2e-6) {
  let worst = 0;
  let peak = 0;
  t.forEach((time, i) => {
    worst = Math.max(worst, Math.abs(y[i] - want(time)));
    peak = Math.max(peak, Math.abs(want(time)));
  });
  expect(worst / peak).toBeLessThan(tolerance);
}

const plant = (num: number[], den: number[], deadTimeS = 0): Plant => ({ num, den, deadTimeS });

describe('linear loops without dead time', () => {
  it('P on a first-order lag: y = K/(1+K)·(1 − e^(−(1+K)t/τ)), K = kp·k', () => {
    const { t, y, u, dy } = respond(plant([2], [5, 1]), idealController({ kp: 3 }), 'setpoint', {
      horizonS: 5,
    });
    expectCurve(t, y, (s) => (6 / 7) * (1 - Math.exp((-7 * s) / 5)));
    expectCurve(t, u, (s) => 3 - (18 / 7) * (1 - Math.exp((-7 * s) / 5)));
    expectCurve(t, dy, (s) => (6 / 5) * Math.exp((-7 * s) / 5), 1e-5);
  });

  it('PI that cancels the lag: first order with τ/K; the gains may have any size', () => {
    for (const k of [1e-7, -4, 2.5e9]) {
      const controller = idealController({ kp: 3 / k, ti: 5 });
      const { t, y } = respond(plant([k], [5, 1]), controller, 'setpoint', { horizonS: 12 });
      expectCurve(t, y, (s) => 1 - Math.exp((-3 * s) / 5));
      // Load: k/(5s+1)/(1 + 3/(5s)) = 5ks/((5s+1)(5s+3)); the step makes it k/2·(e^(−t/5) − e^(−3t/5)).
      const load = respond(plant([k], [5, 1]), controller, 'load', { horizonS: 12 });
      expectCurve(load.t, load.y, (s) => (k / 2) * (Math.exp(-s / 5) - Math.exp((-3 * s) / 5)));
    }
  });

  it('P on k/(s(s+1)): the standard second-order response', () => {
    const { t, y } = respond(plant([1], [1, 1, 0]), idealController({ kp: 4 }), 'setpoint', { horizonS: 14 });
    const wd = Math.sqrt(4 - 0.25);
    expectCurve(t, y, (s) => 1 - Math.exp(-s / 2) * (Math.cos(wd * s) + (0.5 / wd) * Math.sin(wd * s)));
  });

  it('PD with its filter equals P with the same lead in the plant', () => {
    // kp = 3, td = 1, n = 3, b = c = 1 is the lead 3(3+4s)/(3+s): the same loop as P with that lead in the plant.
    const whole = respond(plant([4, 3], [1, 3, 0, 0]), idealController({ kp: 3 }), 'setpoint', {
      horizonS: 9,
    });
    const pd = idealController({ kp: 3, td: 1, n: 3, c: 1 });
    const split = respond(plant([1], [1, 0, 0]), pd, 'setpoint', { horizonS: 9 });
    expectCurve(split.t, split.y, (s) => whole.y[whole.t.indexOf(s)]);
  });

  it('filter of order 1 and 2 on y only: the same loop with the filter moved into the plant, read behind it', () => {
    // Behind the filter the loop cannot tell where the filter sits: u is the same.
    for (const order of [1, 2] as const) {
      const tf = 0.4;
      const f = order === 1 ? [tf, 1] : [(tf * tf) / 2, tf, 1];
      const controller = idealController({ kp: 2, ti: 3 });
      const outside = respond(
        plant([1], [1, 2, 1]),
        { ...controller, filter: { timeConstantS: tf, order } },
        'load',
        {
          horizonS: 15,
        },
      );
      const den = f.reduce<number[]>((sum, c, i) => {
        [1, 2, 1].forEach((d, j) => (sum[i + j] = (sum[i + j] ?? 0) + c * d));
        return sum;
      }, []);
      const inside = respond(plant([1], den), controller, 'load', { horizonS: 15 });
      expectCurve(outside.t, outside.u, (s) => inside.u[inside.t.indexOf(s)]);
    }
  });

  it('algebraic loop of a biproper plant: (0.5s+1)/(2s+1) under P', () => {
    // Closed loop 6(0.5s+1)/(5s+7): y(0+) = 3/5, y(∞) = 6/7, time constant 5/7.
    const { t, y, u } = respond(plant([0.5, 1], [2, 1]), idealController({ kp: 6 }), 'setpoint', {
      horizonS: 6,
    });
    const want = (s: number) => 6 / 7 + (3 / 5 - 6 / 7) * Math.exp((-7 * s) / 5);
    expectCurve(t, y, want);
    expectCurve(t, u, (s) => 6 * (1 - want(s)));
  });
});

describe('linear loops with dead time', () => {
  it('P on k·e^(−θs)/s: the series of the method of steps', () => {
    // y = Σ_{j≥1} (−1)^(j+1) K^j (t − jθ)^j / j! for t > jθ
    const want = (s: number) => {
      let [sum, factorial] = [0, 1];
      for (let j = 1; s > j * 1.5; j += 1) {
        factorial *= j;
        sum -= (-0.34) ** j * ((s - j * 1.5) ** j / factorial);
      }
      return sum;
    };
    const { t, y } = respond(plant([0.2], [1, 0], 1.5), idealController({ kp: 1.7 }), 'setpoint', {
      horizonS: 17,
    });
    expectCurve(t, y, want);
  });

  it('P on a pure dead time: a staircase of the geometric series', () => {
    const { t, y, u } = respond(plant([1], [1], 1), idealController({ kp: 0.5 }), 'setpoint', {
      horizonS: 12.5,
    });
    const level = (s: number) => (1 - (-0.5) ** Math.floor(s)) / 3;
    expectCurve(t, y, level, 1e-12);
    expectCurve(t, u, (s) => 0.5 * (1 - level(s)), 1e-12);
    const load = respond(plant([1], [1], 1), idealController({ kp: 0.5 }), 'load', { horizonS: 12.5 });
    expectCurve(load.t, load.y, (s) => (2 / 3) * (1 - (-0.5) ** Math.floor(s)), 1e-12);
  });

  it('P on a biproper plant with dead time: jumps at every multiple, relaxation between them', () => {
    // (0.5s+1)/(s+1)·e^(−s), K = 0.8. First step: w = 0.8; y = 0.8(1 − 0.5e^(−(t−1))) on [1, 2).
    const { t, y } = respond(plant([0.5, 1], [1, 1], 1), idealController({ kp: 0.8 }), 'setpoint', {
      horizonS: 3,
    });
    expectCurve(t, y, (s) => {
      if (s < 1) return 0;
      const first = 0.8 * (1 - 0.5 * Math.exp(-(s - 1)));
      if (s < 2) return first;
      // Second: minus 0.64(0.5s+1)²/(s(s+1)²) = 0.64·(1/s − 0.75/(s+1) − 0.25/(s+1)²).
      const x = s - 2;
      return first - 0.64 * (1 - 0.75 * Math.exp(-x) - 0.25 * x * Math.exp(-x));
    });
  });

  it('the integral of y after a unit load step is ti/kp, whatever the plant', () => {
    const cases: [Plant, IdealController, number][] = [
      [plant([2], [10, 1], 1), idealController({ kp: 3.2, ti: 3, td: 0.4 }), 40],
      [plant([4], [1, 2, 4], 0.3), idealController({ kp: 0.7, ti: 0.45, td: 0.5, n: 5 }), 12],
      [plant([-2], [3, 1], 0.5), idealController({ kp: -1.4, ti: 2.5 }), 40],
    ];
    for (const [p, c, horizonS] of cases) {
      const { t, y } = respond(p, c, 'load', { horizonS }, 40000);
      const integral = (y.reduce((sum, v) => sum + v, 0) * horizonS) / t.length;
      expect(integral / (c.ti / c.kp)).toBeCloseTo(1, 4);
    }
  });
});

describe('limits and sampling', () => {
  it('P with a limit on an integrator: a ramp until v comes down to the limit, then a first-order rest', () => {
    // 1/s, kp = 4, limit 1: y = t while 4(1 − y) > 1, that is to t = 0.75; then y = 1 − 0.25e^(−4(t − 0.75)).
    const { t, y, u } = respond(plant([1], [1, 0]), idealController({ kp: 4 }), 'setpoint', {
      horizonS: 3,
      actuator: { low: -1, high: 1 },
    });
    expectCurve(t, y, (s) => (s < 0.75 ? s : 1 - 0.25 * Math.exp(-4 * (s - 0.75))));
    expectCurve(t, u, (s) => (s < 0.75 ? 1 : Math.exp(-4 * (s - 0.75))));
  });

  it('back-calculation uses the whole unlimited v', () => {
    // 1/s, kp = 1, ti = 2, limit 0.2, Tt = 0.5, while held: y = 0.2t, v = 1 − y + I, I' = (1−y)/2 + (0.2 − v)/0.5.
    // With z = I: z' = 0.5 − 0.1t + 0.4 − 2(1 − 0.2t) − 2z = −1.1 + 0.3t − 2z → z = −0.625 + 0.15t + 0.625e^(−2t).
    // v = 0.375 − 0.05t + 0.625e^(−2t) > 0.2 until t ≈ 3.5.
    const solved = respond(
      plant([1], [1, 0]),
      idealController({ kp: 1, ti: 2 }),
      'setpoint',
      { horizonS: 5, actuator: { low: -0.2, high: 0.2, trackingTimeS: 0.5 } },
      2000,
    );
    let [low, high] = [3, 4];
    for (let i = 0; i < 60; i += 1) {
      const middle = (low + high) / 2;
      if (0.375 - 0.05 * middle + 0.625 * Math.exp(-2 * middle) > 0.2) low = middle;
      else high = middle;
    }
    const released = solved.t[solved.u.findIndex((v) => v < 0.2 - 1e-6)];
    expect(released).toBeGreaterThanOrEqual(low);
    expect(released).toBeLessThan(low + 0.01);
  });

  it('a rate limit: up along the ramp, down along it while v falls faster, then free', () => {
    // 1/s, kp = 1, slew 0.5. Up: u = t/2, y = t²/4, until u = 1 − y at t1 = √5 − 1 with u1 = t1/2. There v' = −u1 < −0.5:
    // down: v − u = −(u1 − 0.5)s + s²/4 until s2 = 4(u1 − 0.5); from then on u' = −u.
    const t1 = Math.sqrt(5) - 1;
    const u1 = t1 / 2;
    const s2 = 4 * (u1 - 0.5);
    const want = (s: number) => {
      if (s < t1) return s / 2;
      if (s < t1 + s2) return u1 - (s - t1) / 2;
      return (u1 - s2 / 2) * Math.exp(-(s - t1 - s2));
    };
    const { t, u } = respond(plant([1], [1, 0]), idealController({ kp: 1 }), 'setpoint', {
      horizonS: 6,
      actuator: { slew: 0.5 },
    });
    expectCurve(t, u, want);
  });

  it('value and rate limits together with dead time follow a fine Euler integration of the same definition', () => {
    const [kp, ti, low, high, slew, tt, theta] = [3, 4, -0.5, 1.2, 0.4, 2, 1];
    const h = 2e-4;
    const steps = Math.round(20 / h);
    const back = Math.round(theta / h);
    const [us, ys] = [new Float64Array(steps + 1), new Float64Array(steps + 1)];
    let [y, integral, u] = [0, 0, 0];
    for (let i = 0; i <= steps; i += 1) {
      const v = kp * (1 - y) + integral;
      const wanted = Math.min(Math.max(v, low), high);
      if (i > 0) u = Math.min(Math.max(wanted, u - slew * h), u + slew * h);
      [us[i], ys[i]] = [u, y];
      integral += h * ((kp / ti) * (1 - y) + (u - v) / tt);
      y += (h * ((i >= back ? us[i - back] : 0) * 2 - y)) / 10;
    }
    const result = respond(plant([2], [10, 1], theta), idealController({ kp, ti }), 'setpoint', {
      horizonS: 20,
      actuator: { low, high, slew, trackingTimeS: tt },
    });
    expectCurve(result.t, result.y, (s) => ys[Math.round(s / h)], 5e-4);
    expectCurve(result.t, result.u, (s) => us[Math.round(s / h)], 1e-3);
  });

  it('a sampled controller moves by at most slew times its sample time', () => {
    const result = respond(plant([1], [1, 0]), idealController({ kp: 1 }), 'setpoint', {
      horizonS: 2,
      sampleTimeS: 0.5,
      actuator: { slew: 0.5 },
    });
    // u0 = 0.25 from 0, y(0.5) = 0.125; u1 = min(0.875, 0.5) = 0.5, y(1) = 0.375; u2 = min(0.625, 0.75) = 0.625,
    // y(1.5) = 0.6875; u3 = max(0.3125, 0.375) = 0.375.
    expectCurve(result.t, result.u, (s) => [0.25, 0.5, 0.625, 0.375][Math.floor(s / 0.5)], 1e-9);
  });

  it('a sampled P on an integrator: the recursion of its samples, straight lines between them', () => {
    const h = 0.3;
    const { t, y, u } = respond(plant([1], [1, 0]), idealController({ kp: 2 }), 'setpoint', {
      horizonS: 4,
      sampleTimeS: h,
    });
    const sample = (k: number) => 1 - (1 - 2 * h) ** k;
    const held = (s: number) => 2 * (1 - sample(Math.floor(s / h)));
    expectCurve(t, u, held, 1e-9);
    expectCurve(t, y, (s) => sample(Math.floor(s / h)) + held(s) * (s - h * Math.floor(s / h)), 1e-9);
  });

  it('a dead time that is a fraction of the sample time delays the held value by just that', () => {
    const h = 0.5;
    const { t, y } = respond(plant([1], [1, 0], 0.2), idealController({ kp: 1 }), 'setpoint', {
      horizonS: 1.2,
      sampleTimeS: h,
    });
    // u0 = 1 acts from 0.2 to 0.7; y(0.5) = 0.3, so u1 = 0.7 acts from 0.7 to 1.2.
    expectCurve(t, y, (s) => (s < 0.2 ? 0 : s < 0.7 ? s - 0.2 : 0.5 + 0.7 * (s - 0.7)), 1e-9);
  });
});

describe('what cannot be solved', () => {
  it('an unstable loop is refused, not returned as a picture', () => {
    const solved = solveLoop(plant([1], [1, 3, 3, 1]), idealController({ kp: 40 }), 'setpoint', {
      horizonS: 200,
    });
    expect(!solved.ok && solved.code).toBe('ODE_DIVERGED');
  });

  it('a loop that would need too many evaluations is refused', () => {
    const controller = idealController({ kp: 1, ti: 10, filter: { timeConstantS: 1e-6, order: 1 } });
    const solved = solveLoop(plant([1], [10, 1]), controller, 'setpoint', { horizonS: 100, budget: 20_000 });
    expect(!solved.ok && solved.code).toBe('ODE_TOO_COSTLY');
  });
});
