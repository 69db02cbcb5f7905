import { describe, expect, it } from 'vitest';
import { multiply } from '../../lib/control/polynomial';
import { idealController, type Plant } from '../../lib/control/types';
import { ExactRefused, simulateExact, trySimulateExact } from '../../lib/sim/exact';

/** The exact engine against solutions in closed form, worked out beside each check. */
const plant = (num: number[], den: number[], deadTimeS = 0): Plant => ({ num, den, deadTimeS });

function expectCurve(t: Float64Array, y: Float64Array, want: (t: number) => number, error: number): void {
  const worst = Math.max(...t.map((time, i) => Math.abs(y[i] - want(time))));
  expect(worst).toBeLessThan(error);
}

describe('without dead time', () => {
  it('first order under P: (1 − e^(−t/T)) with T = 5/7', () => {
    const { setpoint, load } = simulateExact(plant([2], [5, 1]), idealController({ kp: 3 }), { horizonS: 5 });
    expectCurve(setpoint.t, setpoint.y, (t) => (6 / 7) * (1 - Math.exp((-7 * t) / 5)), 1e-6);
    expectCurve(load.t, load.y, (t) => (2 / 7) * (1 - Math.exp((-7 * t) / 5)), 1e-6);
    expect(setpoint.u[0]).toBeCloseTo(3, 12);
    expect(setpoint.t.length).toBe(600);
  });

  it('algebraic loop of a biproper plant: y(0+) = 3/5 for (0.5s+1)/(2s+1) under P', () => {
    const { setpoint } = simulateExact(plant([0.5, 1], [2, 1]), idealController({ kp: 6 }), { horizonS: 6 });
    expectCurve(setpoint.t, setpoint.y, (t) => 6 / 7 + (3 / 5 - 6 / 7) * Math.exp((-7 * t) / 5), 1e-6);
    expect(setpoint.controlPeak).toBeCloseTo(6 * 0.4, 10);
  });

  it('twentieth order: the load response without controller is the Poisson sum 1 − e^(−t) Σ tᵏ/k!', () => {
    const den = Array.from({ length: 21 }, (_, k) => binomial(20, k));
    const { load } = simulateExact(plant([1], den), idealController({ kp: 0 }), { horizonS: 60, points: 61 });
    const want = (t: number) => {
      let term = Math.exp(-t);
      let sum = term;
      for (let k = 1; k < 20; k += 1) sum += term *= t / k;
      return 1 - sum;
    };
    expectCurve(load.t, load.y, want, 1e-6);
  });

  it('poles six decades apart', () => {
    const { load } = simulateExact(plant([1], [1e-6, 1, 0]), idealController({ kp: 1 }), {
      horizonS: 10,
      points: 11,
    });
    expectCurve(load.t, load.y, (t) => 1 - Math.exp(-t), 3e-6);
  });
});

describe('with dead time', () => {
  it('pure dead time under P: a staircase of the geometric series', () => {
    const { setpoint } = simulateExact(plant([2], [1], 1.5), idealController({ kp: 0.3 }), { horizonS: 11 });
    const want = (t: number) => {
      const echoes = Math.floor(t / 1.5 + 1e-9);
      return (0.6 * (1 - (-0.6) ** echoes)) / 1.6;
    };
    expectCurve(setpoint.t, setpoint.y, want, 1e-12);
  });

  it('integrator under P: the method of steps gives a polynomial on each dead time', () => {
    const [k, theta] = [0.4, 1];
    const { setpoint } = simulateExact(plant([1], [1, 0], theta), idealController({ kp: k }), {
      horizonS: 12,
      points: 241,
    });
    // ẏ(t) = k(1 − y(t − θ)): y = Σ (−1)^(j+1) (k(t − jθ))^j/j! over j ≥ 1 with t > jθ.
    const want = (t: number) => {
      let sum = 0;
      let factorial = 1;
      for (let j = 1; j * theta < t; j += 1) {
        factorial *= j;
        sum -= (-k * (t - j * theta)) ** j / factorial;
      }
      return sum;
    };
    expectCurve(setpoint.t, setpoint.y, want, 1e-6);
  });

  it('the load passes the dead time first', () => {
    const { load } = simulateExact(plant([1], [2, 1], 3), idealController({ kp: 0.1 }), {
      horizonS: 6,
      points: 601,
    });
    expectCurve(load.t.subarray(0, 301), load.y, () => 0, 1e-15);
    expectCurve(load.t, load.y, (t) => (t > 3 ? 1 - Math.exp(-(t - 3) / 2) : 0), 1e-6);
  });

  it('a dead time of a 20,000th of the horizon costs few steps and is still there', () => {
    const controller = idealController({ kp: 2, ti: 1, td: 0.1 });
    const at = (deadTimeS: number) =>
      simulateExact(plant([1], [1, 1], deadTimeS), controller, { horizonS: 8, points: 81 }).setpoint.y;
    const [none, short, double] = [at(0), at(4e-4), at(8e-4)];
    // To first order the difference is proportional to the dead time.
    const difference = Math.max(...none.map((y, i) => Math.abs(short[i] - y)));
    const nonlinear = Math.max(...none.map((y, i) => Math.abs(double[i] - 2 * short[i] + y)));
    expect(difference).toBeGreaterThan(1e-4);
    expect(nonlinear).toBeLessThan(0.02 * difference);
  });
});

describe('steps much longer than the dead time', () => {
  it('a fast ringing plant under a slow integral loop: a dead time of a 10⁻¹⁰ of the horizon changes nothing', () => {
    // Modes at 755 rad/s and a loop whose time constant is half an hour.
    const den = multiply(multiply([1.76e-6, 5.65e-5, 1], [3.9e-5, 2.7e-4, 1]), [2.4e-4, 1, 0]);
    const controller = idealController({ kp: 5.7e-4 });
    const at = (deadTimeS: number) =>
      simulateExact(plant([0.78], den, deadTimeS), controller, { horizonS: 12_000, points: 121 }).load;
    const [none, short] = [at(0), at(1e-6)];
    expectCurve(none.t, short.y, (t) => none.y[none.t.indexOf(t)], 1e-6 * none.peak);
    // ẏ = 0.78·(1 − kp·y) once the fast modes are gone: y(∞) = 1/kp.
    expect(none.peak * 5.7e-4).toBeCloseTo(1 - Math.exp(-12_000 * 0.78 * 5.7e-4), 4);
  });
});

describe('sampled', () => {
  it('integrator under P: the geometric series, straight lines between the samples', () => {
    // y(k+1) = y(k) + h·kp·(1 − y(k)).
    const [h, kp] = [0.5, 0.6];
    const { setpoint } = simulateExact(plant([1], [1, 0]), idealController({ kp }), {
      horizonS: 6,
      points: 121,
      sampleTimeS: h,
    });
    const want = (t: number) => {
      const k = Math.floor(t / h + 1e-9);
      const before = (1 - h * kp) ** k;
      return 1 - before + before * kp * (t - k * h);
    };
    expectCurve(setpoint.t, setpoint.y, want, 1e-12);
  });

  it('the load is there at the first sample of a plant with direct path', () => {
    // y = 0.5·(u + 1): y₀ = 0.5, u₀ = −0.5, y₁ = 0.5·(1 + u₀) …
    const { load } = simulateExact(plant([0.5], [1]), idealController({ kp: 1 }), {
      horizonS: 3.5,
      points: 8,
      sampleTimeS: 1,
    });
    expect(Array.from(load.u)).toEqual([-0.5, -0.5, -0.25, -0.25, -0.375, -0.375, -0.3125, -0.3125]);
  });
});

describe('scales', () => {
  it('time and amplitude scale through seconds, microseconds and months', () => {
    const base = simulateExact(plant([3], [2, 3, 1], 0.7), idealController({ kp: 0.4, ti: 2.5, td: 0.3 }), {
      horizonS: 25,
    });
    for (const [time, gain] of [
      [1e-6, 1e6],
      [1e6, 1e-6],
    ]) {
      const scaled = simulateExact(
        plant([3 * gain], [2 * time * time, 3 * time, 1], 0.7 * time),
        idealController({ kp: 0.4 / gain, ti: 2.5 * time, td: 0.3 * time }),
        { horizonS: 25 * time },
      );
      expectCurve(base.setpoint.t, scaled.setpoint.y, (t) => at(base.setpoint, t), 1e-6);
      expect(scaled.setpoint.itae / time ** 2 / base.setpoint.itae).toBeCloseTo(1, 5);
      expect(scaled.load.iae / gain / time / base.load.iae).toBeCloseTo(1, 5);
    }
  });
});

describe('refusals', () => {
  it('a loop that grows without bound is refused with a sentence', () => {
    const unstable: [Plant, ReturnType<typeof idealController>] = [
      plant([1], [1, -1]),
      idealController({ kp: 0.5 }),
    ];
    expect(trySimulateExact(...unstable, { horizonS: 200 })).toMatchObject({ ok: false, code: 'DIVERGED' });
    expect(() => simulateExact(...unstable, { horizonS: 200 })).toThrow(ExactRefused);
  });

  it('options outside their range are named', () => {
    const run = (options: Parameters<typeof simulateExact>[2]) => () =>
      simulateExact(plant([1], [1, 1]), idealController({ kp: 1 }), options);
    expect(run({ horizonS: 0 })).toThrow(/horizonS must be above 0/);
    expect(run({ horizonS: 1, points: 1 })).toThrow(/points must be a whole number/);
    expect(run({ horizonS: 1, sampleTimeS: -1 })).toThrow(/sampleTimeS must be above 0/);
    expect(run({ horizonS: 1, actuator: { low: 1, high: 1 } })).toThrow(/low must be below/);
  });
});

function at(curve: { t: Float64Array; y: Float64Array }, time: number): number {
  return curve.y[curve.t.indexOf(time)];
}

function binomial(n: number, k: number): number {
  let value = 1;
  for (let i = 0; i < k; i += 1) value = (value * (n - i)) / (i + 1);
  return Math.round(value);
}
