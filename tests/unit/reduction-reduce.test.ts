import { describe, expect, it } from 'vitest';
import { reducePlant } from '../../lib/control/reduction/reduce';
import { stepResponse } from '../../lib/control/reduction/step-response';

describe('stepResponse', () => {
  it('equals the closed forms of first and second order and of a biproper plant', () => {
    const h = 0.07;
    const lag = stepResponse({ num: [2], den: [5, 1] }, h, 200);
    const pair = stepResponse({ num: [4], den: [1, 0.4, 4] }, h, 200);
    const lead = stepResponse({ num: [0.3, 1], den: [1, 1] }, h, 200);
    const [w, zeta] = [2, 0.1];
    const wd = w * Math.sqrt(1 - zeta ** 2);
    for (let i = 0; i < 200; i += 1) {
      const t = i * h;
      expect(lag[i]).toBeCloseTo(2 * (1 - Math.exp(-t / 5)), 12);
      const decay = Math.exp(-zeta * w * t);
      expect(pair[i]).toBeCloseTo(1 - decay * (Math.cos(wd * t) + ((zeta * w) / wd) * Math.sin(wd * t)), 11);
      expect(lead[i]).toBeCloseTo(1 - 0.7 * Math.exp(-t), 12);
    }
  });
});

describe('reducePlant', () => {
  it('returns a plant that has the form already as it is', () => {
    const fopdt = reducePlant({ num: [2], den: [5, 1], deadTimeS: 2.5 }, 'fopdt');
    expect(fopdt).toEqual({
      ok: true,
      value: {
        model: { k: 2, tau: 5, thetaS: 2.5 },
        plant: { num: [2], den: [5, 1], deadTimeS: 2.5 },
        method: 'exact',
        error: 0,
      },
    });
    const integrating = reducePlant({ num: [-0.05], den: [1, 0], deadTimeS: 4 }, 'integrating');
    expect(integrating.ok && integrating.value.model).toEqual({ k: -0.05, thetaS: 4 });
    const asSecond = reducePlant({ num: [2], den: [5, 1], deadTimeS: 1 }, 'sopdt');
    expect(asSecond.ok && asSecond.value.model).toEqual({ k: 2, tau: 5, tau2: 0, thetaS: 1 });
  });

  it('adds half of the sample time to the dead time', () => {
    const reduced = reducePlant({ num: [2], den: [5, 1], deadTimeS: 2.5 }, 'fopdt', { sampleTimeS: 0.4 });
    expect(reduced.ok && reduced.value.model.thetaS).toBeCloseTo(2.7, 12);
  });

  it('states the largest error of the half rule', () => {
    // 1/(s+1)^2 -> τ = 1.5, θ = 0.5: the models differ most where 1 − (1+t)e^(−t) and 1 − e^(−(t−0.5)/1.5) do.
    const reduced = reducePlant({ num: [1], den: [1, 2, 1], deadTimeS: 0 }, 'fopdt');
    let worst = 0;
    for (let t = 0; t <= 6; t += 0.001) {
      const model = t < 0.5 ? 0 : 1 - Math.exp(-(t - 0.5) / 1.5);
      worst = Math.max(worst, Math.abs(1 - (1 + t) * Math.exp(-t) - model));
    }
    expect(reduced.ok && reduced.value.error).toBeCloseTo(worst, 3);
  });

  it('fits the step response where poles are complex, and keeps the static gain', () => {
    const reduced = reducePlant({ num: [12.6], den: [1, 4.2, 9], deadTimeS: 0.3 }, 'fopdt');
    if (!reduced.ok) throw new Error(reduced.message);
    const { model, method, error } = reduced.value;
    expect(method).toBe('step fit');
    expect(model.k).toBeCloseTo(1.4, 12);
    expect(model.thetaS).toBeGreaterThan(0.3);
    expect(error).toBeLessThan(0.2);
  });

  it('finds the lags again when the fit can be perfect', () => {
    // The complex pole pair is cancelled by the same zeros: what is left is 1/((4s+1)(2s+1)).
    const pair = [1, 0.5, 2];
    const times = (p: number[], q: number[]) => {
      const out = new Array<number>(p.length + q.length - 1).fill(0);
      p.forEach((a, i) => q.forEach((b, j) => (out[i + j] += a * b)));
      return out;
    };
    const plant = { num: pair, den: times(pair, times([4, 1], [2, 1])), deadTimeS: 0.5 };
    const reduced = reducePlant(plant, 'sopdt');
    if (!reduced.ok) throw new Error(reduced.message);
    expect(reduced.value.method).toBe('step fit');
    expect(reduced.value.model.tau).toBeCloseTo(4, 3);
    expect(reduced.value.model.tau2).toBeCloseTo(2, 3);
    expect(reduced.value.model.thetaS).toBeCloseTo(0.5, 3);
  });

  it('keeps the ramp of an integrating plant with a complex pair where it ends up', () => {
    // 100/(s(0.1s³+1.04s²+10.4s+100)): the ramp lags by the residence time of the part behind the integrator, 0.104 s.
    const plant = { num: [100], den: [0.1, 1.04, 10.4, 100, 0], deadTimeS: 0.2 };
    const reduced = reducePlant(plant, 'integrating');
    if (!reduced.ok) throw new Error(reduced.message);
    expect(reduced.value.model.k).toBeCloseTo(1, 12);
    expect(reduced.value.model.thetaS).toBeCloseTo(0.304, 3);
  });

  it('takes a slow lag as an integrator, a quick one not', () => {
    const slow = reducePlant({ num: [3], den: [100, 1], deadTimeS: 2 }, 'integrating');
    expect(slow.ok && slow.value.model).toEqual({ k: 0.03, thetaS: 2 });
    const quick = reducePlant({ num: [3], den: [5, 1], deadTimeS: 2 }, 'integrating');
    expect(!quick.ok && quick.code).toBe('NOT_INTEGRATING');
  });

  it('refuses what has no such model', () => {
    const code = (num: number[], den: number[], to: Parameters<typeof reducePlant>[1] = 'fopdt') => {
      const reduced = reducePlant({ num, den, deadTimeS: 1 }, to);
      return reduced.ok ? 'ok' : reduced.code;
    };
    expect(code([1], [1, -1])).toBe('UNSTABLE_PLANT');
    expect(code([1], [1, 0, 1])).toBe('UNSTABLE_PLANT');
    expect(code([1], [1, 0])).toBe('INTEGRATING_PLANT');
    expect(code([1], [1, 0, 0], 'integrating')).toBe('INTEGRATING_PLANT');
    expect(code([1], [1])).toBe('NO_LAG');
    expect(code([1, 0], [1, 2, 1])).toBe('NO_STATIC_GAIN');
  });
});
