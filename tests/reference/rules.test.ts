import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { magnitudeOptimumPid } from '../../lib/control/rules/magnitude-optimum';
import { toIdeal, type NativeSettings } from '../../lib/control/rules/native';
import { placedPid } from '../../lib/control/rules/pole-placement';
import { tune, type RuleId, type TuneRequest, type Tuning, type TuningType } from '../../lib/control/rules';
import { multiply } from '../../lib/control/polynomial';
import type { Plant } from '../../lib/control/types';

/** Every vector of rules.json against `tune`, to 1e-9; the source of a family stands in its test's name. */
const TOLERANCE = 1e-9;

interface Vector {
  readonly id: string;
  readonly rule_id: string;
  readonly controller: string;
  readonly plant: string;
  readonly inputs: Readonly<Record<string, number>>;
  readonly ideal: { readonly Kp: number; readonly Ti: number | null; readonly Td: number };
  readonly native: Readonly<Record<string, number | string | null>>;
}

interface Reference {
  readonly rules: readonly Vector[];
  readonly families: readonly { readonly rule_id_prefix: string; readonly source: string }[];
}

const reference: Reference = JSON.parse(readFileSync(new URL('./rules.json', import.meta.url), 'utf8'));
const vectors = reference.rules;

const RULE_OF_PREFIX: readonly (readonly [prefix: string, rule: RuleId, variant?: string])[] = [
  ['zn_reaction', 'zn-reaction'],
  ['zn_ultimate', 'zn-ultimate'],
  ['tyreus_luyben', 'tyreus-luyben'],
  ['cohen_coon_ah', 'cohen-coon', 'ah'],
  ['cohen_coon', 'cohen-coon'],
  ['chr_sp0', 'chr-setpoint-0'],
  ['chr_sp20', 'chr-setpoint-20'],
  ['chr_ld0', 'chr-load-0'],
  ['chr_ld20', 'chr-load-20'],
  ['lambda', 'lambda'],
  ['imc_fopdt_PIDF', 'imc', 'filter'],
  ['imc_fopdt_PI_improved', 'imc'],
  ['imc_fopdt_PID', 'imc'],
  ['imc_fopdt_PI', 'imc', 'delay-neglected'],
  ['imc', 'imc'],
  ['simc_PI_improved', 'simc', 'improved'],
  ['simc', 'simc'],
  ['amigo', 'amigo'],
  ['lopez_ISE', 'ise-load'],
  ['lopez_IAE', 'iae-load'],
  ['lopez_ITAE', 'itae-load'],
  ['rovira_IAE', 'iae-setpoint'],
  ['rovira_ITAE', 'itae-setpoint'],
  ['mo_', 'magnitude-optimum'],
  ['so_', 'symmetrical-optimum'],
  ['pp_', 'pole-placement'],
];

/** Vectors whose labels no plant can carry; their formula is called directly below. */
const DIRECT: Readonly<Record<string, string>> = {
  'mo_PID T2 < Tsigma': 'compensates the shortest of three lags, where a plant gives its two longest',
  'pp_second_PID alpha ≠ 1': 'the third pole is fixed at the natural frequency',
};

type Inputs = Vector['inputs'];
const lag = (tau: number) => [tau, 1];
const plant = (num: number[], den: number[], deadTimeS = 0): Plant => ({ num, den, deadTimeS });

const PLANT_OF: Readonly<Record<string, (i: Inputs) => Plant>> = {
  fopdt: (i) => plant([i.K], lag(i.tau), i.theta),
  ipdt: (i) => plant([i.K], [1, 0], i.theta),
  sopdt: (i) => plant([i.K], multiply(lag(i.tau1), lag(i.tau2)), i.theta),
  uso: (i) => plant([i.K], [i.tau ** 2, 2 * i.zeta * i.tau, 1], i.theta),
  'K e^{-theta s}': (i) => plant([i.K], [1], i.theta),
  'K e^{-theta s}/s^2': (i) => plant([i.K], [1, 0, 0], i.theta),
  'K e^{-theta s}/(s(tau2 s+1))': (i) => plant([i.K], [i.tau2, 1, 0], i.theta),
  'K e^{-theta s}/(s(tau s+1))': (i) => plant([i.K], [i.tau, 1, 0], i.theta),
  'K e^{-theta s}(T s+1)/(s(tau2 s+1))': (i) => plant([i.K * i.T, i.K], [i.tau2, 1, 0], i.theta),
  'K/(s(tau s+1))': (i) => plant([i.K], [i.tau, 1, 0]),
  'K/s': (i) => plant([i.K], [1, 0]),
  'K/(tau s+1)': (i) => plant([i.K], lag(i.tau)),
  'K/((tau1 s+1)(tau2 s+1))': (i) => plant([i.K], multiply(lag(i.tau1), lag(i.tau2))),
  'K/(tau^2 s^2+2 zeta tau s+1)': (i) => plant([i.K], [i.tau ** 2, 2 * i.zeta * i.tau, 1]),
  'K(-beta s+1)/(tau^2 s^2+2 zeta tau s+1)': (i) =>
    plant([-i.K * i.beta, i.K], [i.tau ** 2, 2 * i.zeta * i.tau, 1]),
  'K/(Ts s+1)': (i) => plant([i.K], lag(i.Tsigma)),
  'K/((T1 s+1)(Ts s+1))': (i) => plant([i.K], multiply(lag(i.T1), lag(i.Tsigma))),
  'K/((T1 s+1)(T2 s+1)(Ts s+1))': (i) =>
    plant([i.K], multiply(multiply(lag(i.T1), lag(i.T2)), lag(i.Tsigma))),
  'K/(s(Ts s+1))': (i) => plant([i.K], [i.Tsigma, 1, 0]),
  'K/(s(T1 s+1)(Ts s+1))': (i) => plant([i.K], [...multiply(lag(i.T1), lag(i.Tsigma)), 0]),
  'b/(s^2+a1 s+a0)': (i) => plant([i.b], [1, i.a1, i.a0]),
  'b/(s(s+a))': (i) => plant([i.b], [1, i.a, 0]),
};

function requestFor(vector: Vector): TuneRequest {
  const { inputs: i } = vector;
  const [, rule, variant] =
    RULE_OF_PREFIX.find(([prefix]) => vector.rule_id.startsWith(prefix)) ?? fail(vector.rule_id);
  const lambdaS =
    i.lambda ?? i.tau_c ?? (i.Tsigma === undefined || i.a === undefined ? undefined : i.a * i.Tsigma);
  const toPlant = PLANT_OF[vector.plant];
  return {
    ...(vector.plant === 'ultimate'
      ? { ultimate: { ku: i.Ku, tu: i.Tu } }
      : { plant: (toPlant ?? fail(vector.plant))(i) }),
    rule,
    type: typeOf(vector.controller),
    ...(variant === undefined ? {} : { variant }),
    ...(lambdaS === undefined ? {} : { lambdaS }),
    ...(i.wn === undefined ? {} : { naturalFrequency: i.wn, dampingRatio: i.zeta }),
  };
}

function typeOf(controller: string): TuningType {
  const types: readonly TuningType[] = ['P', 'I', 'PI', 'PD', 'PID'];
  return types.find((type) => type === controller.replace('+filter', '')) ?? fail(controller);
}

function fail(what: string): never {
  throw new Error(`the test knows no ${what}`);
}

function tuned(vector: Vector): Pick<Tuning, 'controller' | 'native'> {
  const { inputs: i } = vector;
  const direct =
    vector.rule_id === 'mo_PID' && i.T2 < i.Tsigma
      ? magnitudeOptimumPid(i.K, i.T1, i.T2, i.Tsigma)
      : vector.rule_id === 'pp_second_PID' && i.alpha !== 1
        ? placedPid(i.b, i.a1, i.a0, i.wn, i.zeta, i.alpha)
        : null;
  if (typeof direct === 'string') throw new Error(direct);
  if (direct !== null) return { controller: toIdeal(direct), native: direct };
  const result = tune(requestFor(vector));
  if (!result.ok) throw new Error(`${result.code}: ${result.message}`);
  return result.value;
}

/** The native settings under the names of the file. */
function named(native: NativeSettings): Record<string, number> {
  switch (native.form) {
    case 'ideal':
      return { Kp: native.kp, Ti: native.ti, Td: native.td };
    case 'series':
      return { Kc: native.kc, tI: native.tI, tD: native.tD };
    case 'parallel':
      return { Kp: native.kp, Ki: native.ki, Kd: native.kd };
    case 'integral':
      return { Kp: 0, Ki: native.ki, Kd: 0 };
  }
}

function expectClose(actual: number, wanted: number, what: string): void {
  if (actual === wanted) return;
  const difference = Math.abs(actual - wanted) / Math.max(Math.abs(wanted), Number.MIN_VALUE);
  expect(difference, `${what}: ${actual}, wanted ${wanted}`).toBeLessThan(TOLERANCE);
}

function familyOf(ruleId: string) {
  const fitting = reference.families.filter((family) => ruleId.startsWith(family.rule_id_prefix));
  return fitting.sort((a, b) => b.rule_id_prefix.length - a.rule_id_prefix.length)[0];
}

describe('vectors of published rules', () => {
  for (const ruleId of new Set(vectors.map((vector) => vector.rule_id))) {
    it(`${ruleId}: ${familyOf(ruleId).source}`, () => {
      for (const vector of vectors.filter((v) => v.rule_id === ruleId)) {
        const { controller, native } = tuned(vector);
        expectClose(controller.kp, vector.ideal.Kp, `${vector.id} Kp`);
        expectClose(controller.ti, vector.ideal.Ti ?? Infinity, `${vector.id} Ti`);
        expectClose(controller.td, vector.ideal.Td, `${vector.id} Td`);
        expect(native.form === 'integral' ? 'parallel' : native.form, vector.id).toBe(vector.native.form);
        for (const [name, value] of Object.entries(named(native))) {
          const wanted = vector.native[name];
          expectClose(value, typeof wanted === 'number' ? wanted : Infinity, `${vector.id} ${name}`);
        }
        if (typeof vector.native.b === 'number') expect(controller.b, vector.id).toBe(vector.native.b);
        if (typeof vector.native.filter === 'number') {
          expectClose(controller.filter?.timeConstantS ?? NaN, vector.native.filter, `${vector.id} filter`);
        }
        if (typeof vector.native.prefilter === 'number' && 'prefilterTimeS' in native) {
          expectClose(native.prefilterTimeS ?? NaN, vector.native.prefilter, `${vector.id} prefilter`);
        }
      }
    });
  }

  it(`calls the formula itself for ${Object.keys(DIRECT).join(' and ')} only`, () => {
    const direct = vectors.filter(
      ({ rule_id, inputs: i }) =>
        (rule_id === 'mo_PID' && i.T2 < i.Tsigma) || (rule_id === 'pp_second_PID' && i.alpha !== 1),
    );
    expect(direct).toHaveLength(3);
  });
});
