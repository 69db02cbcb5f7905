import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { tune, type RuleId, type TuneRequest, type Tuning, type TuningType } from '../../lib/control/rules';
import type { Plant } from '../../lib/control/types';

/**
 * Worked examples of textbooks and papers against `tune`: the figures stated there within the digits printed, and
 * the recomputed ones to six digits. The source, and whether it was opened, stands in each test's name.
 */
interface Example {
  readonly id: string;
  readonly source: string;
  readonly source_status: string;
  readonly plant: { readonly num: number[]; readonly den: number[]; readonly delay: number };
  readonly rule: string;
  readonly settings: Readonly<Record<string, unknown>>;
  readonly stated: Readonly<Record<string, number | string>>;
  readonly recomputed: Readonly<Record<string, number | string>>;
  readonly match: Readonly<Record<string, string>>;
}

const examples: readonly Example[] = JSON.parse(
  readFileSync(new URL('./published-examples.json', import.meta.url), 'utf8'),
);

type Ask = (example: Example) => TuneRequest;
/** Name of a stated figure → the figure of our tuning. */
type Figures = Readonly<Record<string, (tuning: Tuning) => number>>;

const plantOf = ({ plant }: Example): Plant => ({ num: plant.num, den: plant.den, deadTimeS: plant.delay });
const onPlant =
  (rule: RuleId, type: TuningType, more: Partial<TuneRequest> = {}): Ask =>
  (example) => ({ plant: plantOf(example), rule, type, ...more });
const onUltimate =
  (ku: number, tu: number, rule: RuleId, type: TuningType, variant?: string): Ask =>
  () => ({ ultimate: { ku, tu }, rule, type, ...(variant === undefined ? {} : { variant }) });
/** Examples that give the lag L and time constant T of a step test. */
const onStepTest =
  (lagS: number, timeConstantS: number, type: TuningType): Ask =>
  () => ({ plant: { num: [1], den: [timeConstantS, 1], deadTimeS: lagS }, rule: 'amigo', type });

const IDEAL: Figures = {
  Kp: ({ controller }) => controller.kp,
  Ti: ({ controller }) => controller.ti,
  Td: ({ controller }) => controller.td,
};
const SERIES: Figures = {
  Kc: ({ native, controller }) => (native.form === 'series' ? native.kc : controller.kp),
  tI: ({ native, controller }) => (native.form === 'series' ? native.tI : controller.ti),
  tD: ({ native }) => (native.form === 'series' ? native.tD : 0),
};
const FIGURES: Figures = {
  ...IDEAL,
  ...SERIES,
  Ki: ({ native }) => (native.form === 'integral' ? native.ki : NaN),
};

const CASES: Readonly<Record<string, Ask>> = {
  'AH-AMIGO-PI-balanced': onStepTest(1.42, 2.9, 'PI'),
  'AH-AMIGO-PI-delay': onStepTest(1.01, 0.093, 'PI'),
  'AH-AMIGO-PI-lag': onStepTest(0.075, 1.04, 'PI'),
  'AH-AMIGO-PID-balanced': onStepTest(1.42, 2.9, 'PID'),
  'AH-AMIGO-PID-lag': onStepTest(0.075, 1.04, 'PID'),
  'BQ-6.2-lambda1': onPlant('imc', 'PI', { lambdaS: 1 }),
  'BQ-6.2-lambda10': onPlant('imc', 'PI', { lambdaS: 10 }),
  'BQ-6.2-lambda5': onPlant('imc', 'PI', { lambdaS: 5 }),
  'BQ-M6-IMC-PI-10': onPlant('imc', 'PI', { lambdaS: 10 }),
  'BQ-M6-IMC-PI-9.5': onPlant('imc', 'PI', { lambdaS: 9.5 }),
  'BQ-M6-TL-PI': onUltimate(3.8, 17.16, 'tyreus-luyben', 'PI'),
  'BQ-M6-ZN-P': onUltimate(3.8, 17.16, 'zn-ultimate', 'P'),
  'BQ-M6-ZN-PI': onUltimate(3.8, 17.16, 'zn-ultimate', 'PI'),
  'BQ-T11.1-integrator': onPlant('imc', 'PI', { lambdaS: 5 }),
  'COURSE-ZN-FOPDT': onPlant('zn-reaction', 'PID'),
  'FPE-heat-exchanger-PI-margins': onUltimate(15.3, 42, 'zn-ultimate', 'PI'),
  'KESSLER-MO-course': onPlant('magnitude-optimum', 'PI'),
  'KESSLER-SO': onPlant('symmetrical-optimum', 'PI'),
  'SC-heat-exchanger': onPlant('zn-ultimate', 'PID', { variant: 'rounded-series' }),
  'SEM-DS-PID-tc1': onPlant('imc', 'PID', { lambdaS: 1 }),
  'SEM-DS-PID-tc10': onPlant('imc', 'PID', { lambdaS: 10 }),
  'SEM-DS-PID-tc3': onPlant('imc', 'PID', { lambdaS: 3 }),
  'SEM-blending-1': onPlant('lambda', 'PI', { lambdaS: 5.93 / 3 }),
  'SEM-blending-4': onPlant('itae-load', 'PI'),
  'SEM-blending-5': onPlant('itae-setpoint', 'PI'),
  'SG12-E2-PI': onPlant('simc', 'PI'),
  'SG12-T5.2-first-order': onPlant('simc', 'PI'),
  'SG12-T5.2-integrating': onPlant('simc', 'PI'),
  'SG12-T5.4-delay-improved': onPlant('simc', 'PI', { variant: 'improved' }),
  'SG12-T5.4-delay-simc': onPlant('simc', 'I'),
  'SG12-T5.4-int-simc': onPlant('simc', 'PI'),
  'SG12-T5.4-lag1-improved': onPlant('simc', 'PI', { variant: 'improved' }),
  'SG12-T5.4-lag1-simc': onPlant('simc', 'PI'),
  'SG12-T5.4-lag8-simc': onPlant('simc', 'PI'),
  'SK03-E1-PI': onPlant('simc', 'PI'),
  'SK03-E10-PI': onPlant('simc', 'PI'),
  'SK03-E10-PID': onPlant('simc', 'PID'),
  'SK03-E11-PI': onPlant('simc', 'PI'),
  // The source takes θ = τc = 0.3 s, the plant's own dead time, in its numerator rules.
  'SK03-E12-PI': onPlant('simc', 'PI', { lambdaS: 0.3 }),
  'SK03-E3-PI': onPlant('simc', 'PI'),
  'SK03-E3-PID': onPlant('simc', 'PID'),
  'SK03-E4-PI': onPlant('simc', 'PI'),
  'SK03-E4-PID': onPlant('simc', 'PID'),
  'SK03-E5-PI': onPlant('simc', 'PI'),
  'SK03-E6-PID': onPlant('simc', 'PID'),
  'SK03-E7-PID': onPlant('simc', 'PID'),
  'SK03-E8-PI': onPlant('simc', 'PI'),
  'SK03-E9-PI': onPlant('simc', 'PI'),
  'SK03-E9-PID': onPlant('simc', 'PID'),
  'SP-2.4-PI': onPlant('zn-ultimate', 'PI', { variant: 'rounded' }),
};

/** Examples that state several settings at once. */
const SPLIT: Readonly<Record<string, readonly (readonly [Ask, Figures])[]>> = {
  'FPE-heat-exchanger-ultimate': [
    [onUltimate(15.3, 42, 'zn-ultimate', 'P'), { Kp_P: IDEAL.Kp }],
    [onUltimate(15.3, 42, 'zn-ultimate', 'PI'), { Kp_PI: IDEAL.Kp, Ti_PI: IDEAL.Ti }],
  ],
  'OGATA-8.1-ZN': [
    [onUltimate(30, 2.81, 'zn-ultimate', 'PID'), IDEAL],
    [
      onPlant('zn-ultimate', 'PID'),
      { Ku: ({ usedModel }) => usedModel.parameters.ku, Tu: ({ usedModel }) => usedModel.parameters.tu },
    ],
  ],
  'STEPH-ZN': [
    [onUltimate(12.6, 15.14, 'zn-ultimate', 'PI', 'rounded'), { PI_Kp: IDEAL.Kp, PI_Ti: IDEAL.Ti }],
    [
      onUltimate(12.6, 15.14, 'zn-ultimate', 'PID', 'rounded'),
      { PID_Kp: IDEAL.Kp, PID_Ti: IDEAL.Ti, PID_Td: IDEAL.Td },
    ],
  ],
};

/** Why the other examples say nothing about a rule. */
const ELSEWHERE: readonly (readonly [ids: RegExp, reason: string])[] = [
  [/^(BQ-11\.3-relay|RELAY-)/, 'a relay experiment'],
  [/^(BQ-5\.3-ultimate|BQ-M6-ultimate)$/, 'an ultimate point alone'],
  [/^(BQ-7\.3-margins|BQ-T5\.1-|PC-|NK-)/, 'margins, poles or responses of given loops'],
  [/^FPE-4\.9-/, 'gains given without a rule'],
  [/^(SG12-E2-P-step-test|SG12-E2-half-rule-1)$/, 'identification and model reduction'],
  [/^SG12-F5\.9-/, 'its closed-loop time is read from a plot and not stated'],
  [/^SG12-T5\.3-/, 'settings found by numerical optimisation, no rule'],
];

describe('worked examples of published rules', () => {
  for (const example of examples) {
    const parts =
      SPLIT[example.id] ?? (CASES[example.id] === undefined ? [] : [[CASES[example.id], FIGURES]]);
    if (parts.length === 0) continue;
    it(`${example.id}: ${example.source} (${example.source_status})`, () => {
      let compared = 0;
      for (const [ask, figures] of parts) {
        const result = tune(ask(example));
        if (!result.ok) throw new Error(`${result.code}: ${result.message}`);
        for (const [name, figure] of Object.entries(figures)) {
          compared += compare(example, name, figure(result.value));
        }
      }
      expect(compared).toBeGreaterThan(0);
    });
  }

  it('covers every example, or says why it is about something else', () => {
    const open = examples.filter(
      ({ id }) => !(id in CASES) && !(id in SPLIT) && !ELSEWHERE.some(([ids]) => ids.test(id)),
    );
    expect(open.map(({ id }) => id)).toEqual([]);
  });
});

/** Compares one figure with what the example states (else with its settings) and with the recomputed value. */
function compare({ id, stated, settings, recomputed, match }: Example, name: string, ours: number): number {
  const wanted = stated[name] ?? settings[name];
  if (typeof wanted !== 'number') return 0;
  const share = match[name] === 'within 2 %' ? 0.02 : match[name] === 'within 5 %' ? 0.05 : 0;
  const allowed = Math.max(share * Math.abs(wanted), Math.min(lastDigit(wanted), 0.02 * Math.abs(wanted)));
  expect(Math.abs(ours - wanted), `${id} ${name}: ${ours}, stated ${wanted}`).toBeLessThanOrEqual(
    allowed * (1 + 1e-9) + 1e-12,
  );
  const exact = recomputed[name];
  if (typeof exact === 'number' && name in match) {
    expect(Math.abs(ours - exact), `${id} ${name}: ${ours}, recomputed ${exact}`).toBeLessThanOrEqual(
      1e-6 * Math.abs(exact),
    );
  }
  return 1;
}

/** One unit of the last digit of a number as it is printed. */
function lastDigit(value: number): number {
  return 10 ** -(String(value).split('.')[1] ?? '').length;
}
