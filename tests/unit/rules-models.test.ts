import { describe, expect, it } from 'vitest';
import { tune, type TuneRequest, type Tuning } from '../../lib/control/rules';
import { multiply } from '../../lib/control/polynomial';
import { roots } from '../../lib/control/roots';
import type { IdealController, Plant } from '../../lib/control/types';

function tuned(request: TuneRequest): Tuning {
  const result = tune(request);
  if (!result.ok) throw new Error(`${result.code}: ${result.message}`);
  return result.value;
}

/** Characteristic polynomial of the loop without dead time and without derivative filter. */
function characteristic({ num, den }: Plant, { kp, ti, td }: IdealController): number[] {
  const integrates = ti < Infinity;
  const top = integrates ? [kp * td, kp, kp / ti] : [kp * td, kp];
  const bottom = integrates ? [1, 0] : [1];
  const loop = multiply(num, top);
  const open = multiply(den, bottom);
  const length = Math.max(loop.length, open.length);
  const at = (p: readonly number[], i: number) => p[i - (length - p.length)] ?? 0;
  return Array.from({ length }, (_, i) => at(loop, i) + at(open, i)).slice(length - open.length);
}

describe('the model that a rule uses', () => {
  it('is the exact one where the rule has a row for it', () => {
    const plant: Plant = { num: [2], den: multiply([10, 1], [3, 1]), deadTimeS: 1 };
    const { usedModel } = tuned({ plant, rule: 'simc', type: 'PID' });
    expect(usedModel.method).toBe('exact');
    expect(usedModel.shape).toBe('second-order-real');
    expect(usedModel.parameters.tau1).toBeCloseTo(10, 12);
    expect(usedModel.parameters.tau2).toBeCloseTo(3, 12);
  });

  it('is reduced by the half rule for PI: τ = τ1 + τ2/2, θ grows by τ2/2', () => {
    const plant: Plant = { num: [2], den: multiply([10, 1], [3, 1]), deadTimeS: 1 };
    const { usedModel } = tuned({ plant, rule: 'simc', type: 'PI' });
    expect(usedModel).toMatchObject({ shape: 'first-order', method: 'half rule' });
    expect(usedModel.parameters.tau).toBeCloseTo(11.5, 12);
    expect(usedModel.parameters.theta).toBeCloseTo(2.5, 12);
  });

  it('takes the integrator of an integrating plant, with its lag for PID', () => {
    const plant: Plant = { num: [1], den: [...multiply([2, 1], [1, 1]), 0], deadTimeS: 1 };
    expect(tuned({ plant, rule: 'lambda', type: 'PI' }).usedModel).toMatchObject({
      shape: 'integrator',
      parameters: { k: 1, theta: 3 },
    });
    const { usedModel } = tuned({ plant, rule: 'simc', type: 'PID' });
    expect(usedModel.shape).toBe('integrator-lag');
    expect(usedModel.parameters.tau).toBeCloseTo(2.5, 12);
    expect(usedModel.parameters.theta).toBeCloseTo(1.5, 12);
  });

  it('warns when the reduced model is far from the plant, refuses when it is too far', () => {
    const four: Plant = { num: [1], den: [1, 4, 6, 4, 1], deadTimeS: 0 };
    const { warnings, usedModel } = tuned({ plant: four, rule: 'simc', type: 'PI' });
    expect(usedModel.error).toBeGreaterThan(0.1);
    expect(warnings.join()).toMatch(/reduced model \(half rule\).*differs/);
    const oscillating: Plant = { num: [1], den: [1, 0.2, 1], deadTimeS: 0.1 };
    expect(tune({ plant: oscillating, rule: 'simc', type: 'PI' })).toMatchObject({
      ok: false,
      code: 'PLANT_NOT_SERVED',
    });
  });

  it('refuses unstable plants and plants without an ultimate gain in words', () => {
    const unstable: Plant = { num: [1], den: [1, -1], deadTimeS: 0.1 };
    for (const rule of ['simc', 'zn-ultimate', 'zn-reaction'] as const) {
      const result = tune({ plant: unstable, rule, type: 'PI' });
      expect(result.ok ? '' : result.message).toMatch(/unstable/);
    }
    const lag: Plant = { num: [1], den: [1, 1], deadTimeS: 0 };
    const result = tune({ plant: lag, rule: 'zn-ultimate', type: 'PI' });
    expect(result.ok ? '' : result.message).toMatch(/oscillate/);
  });

  it('warns when the loop around the plant itself is unstable', () => {
    // A lightly damped pair (ζ = 0.2) with dead time: the integral takes more phase than the loop has.
    const plant: Plant = { num: [1], den: [1, 0.4, 1], deadTimeS: 0.1 };
    expect(tuned({ plant, rule: 'zn-ultimate', type: 'PI' }).warnings[0]).toMatch(/unstable/);
  });
});

describe('closed loops that the rules promise', () => {
  it('pole placement puts the poles where they are wanted', () => {
    const zeta = 0.6;
    const w = 7;
    const wanted = multiply([1, 2 * zeta * w, w * w], [1, w]);
    for (const den of [multiply([0.5, 1], [0.2, 1]), [0.04, 0.08, 1], [0.5, 1, 0], [1, 0, 0]]) {
      const plant: Plant = { num: [3], den, deadTimeS: 0 };
      const request = { plant, rule: 'pole-placement', dampingRatio: zeta, naturalFrequency: w } as const;
      const monic = characteristic(plant, tuned({ ...request, type: 'PID' }).controller);
      monic.map((c) => c / monic[0]).forEach((c, i) => expect(c).toBeCloseTo(wanted[i], 8));
    }
    for (const den of [
      [0.5, 1],
      [1, 0],
    ]) {
      const plant: Plant = { num: [3], den, deadTimeS: 0 };
      const { controller } = tuned({
        plant,
        rule: 'pole-placement',
        type: 'PI',
        dampingRatio: zeta,
        naturalFrequency: w,
      });
      const monic = characteristic(plant, controller);
      expect(monic[1] / monic[0]).toBeCloseTo(2 * zeta * w, 10);
      expect(monic[2] / monic[0]).toBeCloseTo(w * w, 10);
    }
  });

  it('pole placement has a controller at every position of its dial', () => {
    for (const [den, theta] of [
      [multiply([0.5, 1], [0.2, 1]), 0],
      [[0.5, 1, 0], 0.05],
      [[1, 0, 0], 0.1],
    ] as const) {
      for (const aggressiveness of [0, 0.3, 0.5, 0.8, 1]) {
        const plant: Plant = { num: [3], den, deadTimeS: theta };
        const { warnings } = tuned({ plant, rule: 'pole-placement', type: 'PID', aggressiveness });
        expect(warnings.join()).not.toMatch(/unstable/);
      }
    }
  });

  it('magnitude optimum: damping 1/√2 and natural frequency 1/(√2 Tσ), Kessler 1955', () => {
    const smallLagS = 0.4;
    const plant: Plant = { num: [2], den: multiply([5, 1], [smallLagS, 1]), deadTimeS: 0 };
    const poles = roots(
      characteristic(plant, tuned({ plant, rule: 'magnitude-optimum', type: 'PI' }).controller),
    );
    const pair = poles.filter((pole) => pole.im !== 0);
    expect(pair).toHaveLength(2);
    expect(Math.hypot(pair[0].re, pair[0].im)).toBeCloseTo(1 / (Math.SQRT2 * smallLagS), 9);
    expect(-pair[0].re / Math.hypot(pair[0].re, pair[0].im)).toBeCloseTo(Math.SQRT1_2, 9);
  });

  it('symmetrical optimum: poles of 1 + 4x + 8x² + 8x³ with x = Tσ s, Kessler 1958', () => {
    const smallLagS = 0.4;
    const plant: Plant = { num: [2], den: [smallLagS, 1, 0], deadTimeS: 0 };
    const { controller } = tuned({ plant, rule: 'symmetrical-optimum', type: 'PI' });
    const polynomial = characteristic(plant, controller);
    const wanted = [8 * smallLagS ** 3, 8 * smallLagS ** 2, 4 * smallLagS, 1];
    polynomial.forEach((c, i) => expect(c / polynomial[3]).toBeCloseTo(wanted[i], 10));
    expect(controller.b).toBe(0);
  });

  it('IMC and lambda give the wanted first-order loop where the plant has no dead time', () => {
    const plant: Plant = { num: [2], den: multiply([5, 1], [2, 1]), deadTimeS: 0 };
    const { controller } = tuned({ plant, rule: 'imc', type: 'PID', lambdaS: 0.7 });
    const slowest = roots(characteristic(plant, controller)).map((pole) => pole.re);
    expect(Math.min(...slowest)).toBeCloseTo(-1 / 0.7, 9);
  });

  it('the set-point weight of the series PID stands for the prefilter of the symmetrical optimum', () => {
    const plant: Plant = { num: [2], den: [...multiply([5, 1], [0.4, 1]), 0], deadTimeS: 0 };
    const { controller, native } = tuned({ plant, rule: 'symmetrical-optimum', type: 'PID' });
    if (native.form !== 'series') throw new Error(native.form);
    // kc(1 + τI s)(1 + τD s)/(τI s)/(τI s + 1) = kp(b + 1/(ti s)): compare the constant and the 1/s parts.
    expect(controller.kp * controller.b).toBeCloseTo((native.kc * native.tD) / native.tI, 12);
    expect(controller.kp / controller.ti).toBeCloseTo(native.kc / native.tI, 12);
    expect(controller.c).toBe(0);
  });
});
