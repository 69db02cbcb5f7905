import { describe, expect, it } from 'vitest';
import { RULES, tune, type TuneRequest, type Tuning } from '../../lib/control/rules';
import type { Plant } from '../../lib/control/types';

const FOPDT: Plant = { num: [2], den: [10, 1], deadTimeS: 4 };
const LAG: Plant = { num: [2], den: [10, 1], deadTimeS: 0 };
const DEAD_TIME: Plant = { num: [2], den: [1], deadTimeS: 4 };

function tuned(request: TuneRequest): Tuning {
  const result = tune(request);
  if (!result.ok) throw new Error(`${result.code}: ${result.message}`);
  return result.value;
}

function refusal(request: TuneRequest): string {
  const result = tune(request);
  return result.ok ? 'served' : `${result.code}: ${result.message}`;
}

describe('a rule that cannot serve says why', () => {
  it.each(RULES.filter(({ deadTimeRatio }) => deadTimeRatio !== undefined).map(({ id }) => id))(
    '%s needs a dead time',
    (rule) => {
      expect(refusal({ plant: LAG, rule, type: 'PI' })).toMatch(/PLANT_NOT_SERVED.*dead time greater than 0/);
    },
  );

  it.each([
    [{ plant: FOPDT, rule: 'lambda', type: 'PID' }, /TYPE_NOT_OFFERED: Lambda tuning gives PI/],
    [
      { plant: FOPDT, rule: 'simc', type: 'PI', variant: 'ah' },
      /UNKNOWN_VARIANT: SIMC has the variants improved/,
    ],
    [{ plant: FOPDT, rule: 'amigo', type: 'PI', variant: 'ah' }, /AMIGO has no variants/],
    [{ plant: FOPDT, rule: 'simc', type: 'PID', variant: 'improved' }, /TYPE_NOT_OFFERED.*gives PI settings/],
    [{ ultimate: { ku: 1, tu: 1 }, rule: 'simc', type: 'PI' }, /PLANT_NEEDED/],
    [{ plant: FOPDT, rule: 'simc', type: 'PID' }, /PLANT_NOT_SERVED.*two lags.*this is a first-order plant/],
    [{ plant: DEAD_TIME, rule: 'zn-reaction', type: 'PI' }, /PLANT_NOT_SERVED.*a gain with dead time/],
    [{ plant: LAG, rule: 'imc', type: 'PID' }, /ask for PI/],
    [{ plant: LAG, rule: 'magnitude-optimum', type: 'PI' }, /Tσ/],
    [
      { plant: { num: [1], den: [1, 0], deadTimeS: 1 }, rule: 'imc', type: 'P' },
      /published for plants without dead time/,
    ],
    [
      { plant: LAG, rule: 'pole-placement', type: 'PI', naturalFrequency: 0.01 },
      /NO_POSSIBLE_CONTROLLER.*above 0\.07143 rad\/s/,
    ],
    // Rovira: τ/ti = 1.02 − 0.323 r turns negative beyond r = 3.16.
    [
      { plant: { num: [1], den: [1, 1], deadTimeS: 4 }, rule: 'iae-setpoint', type: 'PI' },
      /outside the range/,
    ],
    // Cohen–Coon PD: td = θ(6 − 2r)/(22 + 3r) turns negative beyond r = 3.
    [{ plant: { num: [1], den: [1, 1], deadTimeS: 4 }, rule: 'cohen-coon', type: 'PD' }, /outside the range/],
  ] as const)('%o', (request, words) => {
    expect(refusal(request)).toMatch(words);
  });

  it('throws for numbers outside their range', () => {
    const request = { plant: FOPDT, rule: 'simc', type: 'PI' } as const;
    expect(() => tune({ ...request, aggressiveness: 1.1 })).toThrow(RangeError);
    expect(() => tune({ ...request, lambdaS: 0 })).toThrow(RangeError);
    expect(() => tune({ ...request, ultimate: { ku: 0, tu: 1 } })).toThrow(RangeError);
    expect(() => tune({ ...request, ultimate: { ku: 1, tu: -1 } })).toThrow(RangeError);
  });
});

describe('warnings', () => {
  it('say when the dead time ratio lies outside the published range', () => {
    const plant: Plant = { num: [1], den: [1, 1], deadTimeS: 2 };
    expect(tuned({ plant, rule: 'zn-reaction', type: 'PI' }).warnings.join()).toMatch(
      /is 2, the rule holds from 0\.1 to 1/,
    );
    expect(tuned({ plant, rule: 'cohen-coon', type: 'PI' }).warnings.join()).toMatch(/holds up to about 1/);
    expect(tuned({ plant: FOPDT, rule: 'zn-reaction', type: 'PI' }).warnings).toEqual([]);
  });

  it('do not come from rounding at the end of the range', () => {
    const plant: Plant = { num: [1], den: [0.3, 1], deadTimeS: 0.1 + 0.2 };
    expect(tuned({ plant, rule: 'zn-reaction', type: 'PI' }).warnings).toEqual([]);
  });

  it('say that integral-only settings stand in the native form alone', () => {
    const { controller, native, warnings } = tuned({ plant: DEAD_TIME, rule: 'simc', type: 'I' });
    expect(native).toEqual({ form: 'integral', ki: 1 / (2 * 8) });
    expect(controller).toMatchObject({ kp: 0, ti: Infinity, td: 0 });
    expect(warnings.join()).toMatch(/ideal form cannot say that/);
  });

  it('say which given settings were not used', () => {
    const { warnings } = tuned({ plant: FOPDT, rule: 'amigo', type: 'PI', lambdaS: 1, naturalFrequency: 1 });
    expect(warnings).toHaveLength(2);
  });
});

describe('every rule', () => {
  it('turns the sign of the gain with the plant', () => {
    for (const { id, types } of RULES) {
      for (const type of types) {
        const request = { rule: id, type, plant: FOPDT, ultimate: { ku: 3, tu: 20 } };
        const forward = tune(request);
        const reverse = tune({ ...request, plant: { ...FOPDT, num: [-2] }, ultimate: { ku: -3, tu: 20 } });
        expect(reverse.ok).toBe(forward.ok);
        if (!forward.ok || !reverse.ok) continue;
        expect(reverse.value.controller.kp).toBeCloseTo(-forward.value.controller.kp, 12);
        expect(reverse.value.controller.ti).toBe(forward.value.controller.ti);
        expect(reverse.value.controller.td).toBe(forward.value.controller.td);
      }
    }
  });

  it('scales with time: all times of the plant doubled double all times of the controller', () => {
    const slower: Plant = { num: [2], den: [20, 1], deadTimeS: 8 };
    for (const { id, types } of RULES) {
      for (const type of types) {
        const one = tune({ rule: id, type, plant: FOPDT, ultimate: { ku: 3, tu: 20 } });
        const two = tune({ rule: id, type, plant: slower, ultimate: { ku: 3, tu: 40 } });
        if (!one.ok || !two.ok) continue;
        expect(two.value.controller.kp).toBeCloseTo(one.value.controller.kp, 12);
        expect(two.value.controller.td).toBeCloseTo(2 * one.value.controller.td, 10);
        if (one.value.controller.ti < Infinity) {
          expect(two.value.controller.ti).toBeCloseTo(2 * one.value.controller.ti, 10);
        }
      }
    }
  });

  it('has facts for its readers', () => {
    expect(new Set(RULES.map(({ id }) => id)).size).toBe(RULES.length);
    for (const rule of RULES) {
      expect(rule.validity.length * rule.aim.length * rule.source.length).toBeGreaterThan(0);
      expect(rule).not.toHaveProperty('rows');
    }
  });
});
