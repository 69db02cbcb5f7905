import { describe, expect, it } from 'vitest';
import { RULES, tune, type RuleId, type TuneRequest, type Tuning } from '../../lib/control/rules';
import type { Plant } from '../../lib/control/types';

/** The dial as designed: 0.5 the recommendation, 0 four times slower, 1 the source's limit or half; log scale. */
const FOPDT: Plant = { num: [2], den: [10, 1], deadTimeS: 4 };

function tuned(request: TuneRequest): Tuning {
  const result = tune(request);
  if (!result.ok) throw new Error(`${result.code}: ${result.message}`);
  return result.value;
}

function at(rule: RuleId, aggressiveness: number, type: 'PI' | 'PID' = 'PI', plant = FOPDT): Tuning {
  return tuned({ plant, rule, type, aggressiveness });
}

describe('dial of rules with a closed-loop time', () => {
  it.each([
    // Dahlin's λ: recommended max(3θ, τ/3) = 12 s, not below θ = 4 s.
    ['lambda', 'PI', 12, 4],
    // Rivera et al.: PI least max(0.2 τ, 1.7 θ) = 6.8 s, PID max(0.2 τ, 0.8 θ) = 3.2 s; recommended 1.5 times that.
    ['imc', 'PI', 10.2, 6.8],
    ['imc', 'PID', 4.8, 3.2],
    // Skogestad: τc = θ = 4 s, no limit named.
    ['simc', 'PI', 4, 2],
  ] as const)('%s %s: recommended %f s, fastest %f s', (rule, type, recommended, fastest) => {
    for (const [position, wanted] of [
      [0, 4 * recommended],
      [0.25, 2 * recommended],
      [0.5, recommended],
      [0.75, Math.sqrt(recommended * fastest)],
      [1, fastest],
    ]) {
      const { dial, warnings } = at(rule, position, type);
      expect(dial.value).toBeCloseTo(wanted, 12);
      expect(dial).toMatchObject({
        kind: 'closed-loop-time',
        unit: 's',
        aggressiveness: position,
        maximum: 1,
      });
      expect(dial.calm).toBeCloseTo(4 * recommended, 12);
      expect(dial.sharp).toBeCloseTo(fastest, 12);
      expect(warnings).toEqual([]);
    }
  });

  it('is the rule as published without a position and without a time', () => {
    for (const rule of ['lambda', 'imc', 'simc'] as const) {
      expect(tuned({ plant: FOPDT, rule, type: 'PI' })).toEqual(at(rule, 0.5));
    }
  });

  it('gives way to a closed-loop time, and says where that stands on the dial', () => {
    const given = tuned({ plant: FOPDT, rule: 'simc', type: 'PI', lambdaS: 8, aggressiveness: 1 });
    expect(given.dial.value).toBe(8);
    expect(given.dial.aggressiveness).toBeCloseTo(0.25, 12);
    expect(given.controller).toEqual(at('simc', 0.25).controller);
    const { aggressiveness: sharper } = tuned({ plant: FOPDT, rule: 'simc', type: 'PI', lambdaS: 2.5 }).dial;
    expect(at('simc', sharper ?? NaN).dial.value).toBeCloseTo(2.5, 12);
    expect(tuned({ plant: FOPDT, rule: 'simc', type: 'PI', lambdaS: 0.1 }).dial.aggressiveness).toBeNull();
    expect(tuned({ plant: FOPDT, rule: 'simc', type: 'PI', lambdaS: 100 }).dial.aggressiveness).toBeNull();
  });

  it('warns below the limit of the source', () => {
    const { warnings } = tuned({ plant: FOPDT, rule: 'imc', type: 'PI', lambdaS: 1 });
    expect(warnings.join()).toMatch(/λ = 1 s is below 6\.8 s.*λ > 1\.7 θ/);
    expect(tuned({ plant: FOPDT, rule: 'lambda', type: 'PI', lambdaS: 1 }).warnings.join()).toMatch(/λ ≥ θ/);
  });

  it('still tunes SIMC without dead time, and says by what', () => {
    const { dial, warnings } = at('simc', 0.5, 'PI', { num: [2], den: [10, 1], deadTimeS: 0 });
    expect(dial.value).toBeCloseTo(10 / 3, 12);
    expect(warnings.join()).toMatch(/common practice/);
  });

  it('asks for the time where the plant has none of its own', () => {
    const integrator: Plant = { num: [1], den: [1, 0], deadTimeS: 0 };
    for (const rule of ['lambda', 'imc', 'simc'] as const) {
      expect(tune({ plant: integrator, rule, type: 'PI', aggressiveness: 0.2 })).toMatchObject({
        ok: false,
        code: 'SETTING_NEEDED',
      });
      const { dial } = tuned({ plant: integrator, rule, type: 'PI', lambdaS: 3 });
      expect(dial).toMatchObject({ kind: 'none', value: 3, aggressiveness: null });
    }
  });

  it('sets the frequency of pole placement: calm is slower', () => {
    const plant: Plant = { num: [2], den: [10, 1], deadTimeS: 0 };
    const middle = at('pole-placement', 0.5, 'PI', plant).dial;
    expect(middle).toMatchObject({ unit: 'rad/s', symbol: 'ω' });
    expect(middle.calm).toBeCloseTo(middle.value / 4, 12);
    expect(middle.sharp).toBeCloseTo(middle.value * 2, 12);
    expect(at('pole-placement', 0, 'PI', plant).dial.value).toBeCloseTo(middle.calm, 12);
    expect(at('pole-placement', 1, 'PI', plant).dial.value).toBeCloseTo(middle.sharp, 12);
  });

  it('makes the symmetrical optimum calmer by a, never sharper than a = 2', () => {
    const plant: Plant = { num: [2], den: [0.5, 1, 0], deadTimeS: 0 };
    const calm = at('symmetrical-optimum', 0, 'PI', plant);
    // a = 8: kp = 1/(a k Tσ), ti = a² Tσ.
    expect(calm.controller.kp).toBeCloseTo(1 / (8 * 2 * 0.5), 12);
    expect(calm.controller.ti).toBeCloseTo(64 * 0.5, 12);
    expect(calm.dial).toMatchObject({ maximum: 0.5, sharp: 1, calm: 4 });
    expect(tune({ plant, rule: 'symmetrical-optimum', type: 'PI', aggressiveness: 0.6 })).toMatchObject({
      ok: false,
      code: 'AGGRESSIVENESS_NOT_OFFERED',
    });
  });
});

describe('dial of the other rules', () => {
  const others = RULES.filter(({ setting, id }) => setting === null && id !== 'magnitude-optimum');

  it.each(others.map(({ id }) => id))('%s: divides the gain, keeps the times, ends at 0.5', (rule) => {
    const request = { plant: FOPDT, ultimate: { ku: 3, tu: 20 }, rule, type: 'PI' } as const;
    const published = tuned(request);
    expect(published.dial).toMatchObject({ kind: 'detuning', value: 1, maximum: 0.5, calm: 4, sharp: 1 });
    expect(published.dial.reason).toMatch(/source names nothing faster/);
    for (const [aggressiveness, factor] of [
      [0.5, 1],
      [0.25, 2],
      [0, 4],
    ]) {
      const { controller, dial } = tuned({ ...request, aggressiveness });
      expect(dial.value).toBeCloseTo(factor, 12);
      expect(controller.kp).toBeCloseTo(published.controller.kp / factor, 12);
      expect(controller.ti).toBe(published.controller.ti);
    }
    const refusal = tune({ ...request, aggressiveness: 0.51 });
    expect(refusal).toMatchObject({ ok: false, code: 'AGGRESSIVENESS_NOT_OFFERED' });
  });

  it('warns that an integrating plant is damped less by detuning', () => {
    const plant: Plant = { num: [1], den: [1, 0], deadTimeS: 1 };
    expect(at('amigo', 0.2, 'PI', plant).warnings.join()).toMatch(/damps less/);
    expect(at('amigo', 0.5, 'PI', plant).warnings).toEqual([]);
  });
});
