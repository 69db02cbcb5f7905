import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { multiply } from '../../lib/control/polynomial';
import { numeratorRule } from '../../lib/control/reduction/numerator-rule';
import { recognisePlant } from '../../lib/control/reduction/recognise';
import { reducePlant } from '../../lib/control/reduction/reduce';
import type { Plant } from '../../lib/control/types';

/** Half rule and numerator rules of Skogestad & Grimholt (2012), eq. 5.12-5.15; computed apart from this repository. */
const vectors = JSON.parse(readFileSync(new URL('./rules.json', import.meta.url), 'utf8')).identification as {
  id: string;
  method: string;
  inputs: Record<string, unknown>;
  outputs: Record<string, unknown>;
}[];

interface HalfRuleInputs {
  lags: (number | null)[];
  inv?: number[];
  theta0?: number;
}

function plantFrom({ lags, inv = [], theta0 = 0 }: HalfRuleInputs): Plant {
  return {
    num: inv.map((t) => [-t, 1]).reduce((p, q) => multiply(p, q), [1]),
    den: lags.map((tau) => (tau === null ? [1, 0] : [tau, 1])).reduce((p, q) => multiply(p, q), [1]),
    deadTimeS: theta0,
  };
}

describe('half rule', () => {
  for (const { id, method, inputs, outputs } of vectors.filter((v) => /^half_rule_order/.test(v.method))) {
    it(id, () => {
      const given = inputs as unknown as HalfRuleInputs;
      const integrating = given.lags.includes(null);
      const second = method === 'half_rule_order2';
      const to = integrating ? (second ? 'integrating-lag' : 'integrating') : second ? 'sopdt' : 'fopdt';
      const reduced = reducePlant(plantFrom(given), to);
      if (!reduced.ok) throw new Error(reduced.message);
      const { model, method: way } = reduced.value;
      expect(['half rule', 'exact']).toContain(way);
      expect(model.thetaS).toBeCloseTo(Number(outputs.theta), 9);
      if (outputs.tau1 !== null) expect(model.tau).toBeCloseTo(Number(outputs.tau1), 9);
      if (second) expect(model.tau2).toBeCloseTo(Number(outputs.tau2), 9);
    });
  }

  for (const { id, inputs, outputs } of vectors.filter((v) => v.method === 'half_rule_numerator')) {
    it(id, () => {
      const pair = numeratorRule(Number(inputs.T0), Number(inputs.tau0), Number(inputs.tau_c));
      expect(pair.rule).toBe(outputs.rule);
      expect(pair.gain).toBeCloseTo(Number(outputs.gain), 9);
      expect(pair.lag).toBeCloseTo(Number(outputs.lag), 9);
    });
  }
});

/**
 * Worked examples of Skogestad (2003), stated from memory, and of Skogestad & Grimholt (2012), E2: the SIMC settings
 * with τc = θ, series form, follow from the reduced model alone.
 */
describe('published half-rule examples', () => {
  const examples = JSON.parse(
    readFileSync(new URL('./published-examples.json', import.meta.url), 'utf8'),
  ) as {
    id: string;
    rule: string;
    plant: { num: number[]; den: number[]; delay: number };
    recomputed: Record<string, number>;
  }[];
  const simc = examples.filter((e) => /^SK03-E/.test(e.id) && /^SIMC, tau_c = theta/.test(e.rule));
  it('has its examples', () => expect(simc.length).toBeGreaterThan(10));
  for (const { id, plant, recomputed } of simc) {
    it(id, () => {
      const given = { num: plant.num, den: plant.den, deadTimeS: plant.delay };
      const integrating = plant.den[plant.den.length - 1] === 0;
      const withDerivative = recomputed.tD !== undefined && recomputed.tD > 0;
      const reduced = reducePlant(
        given,
        integrating
          ? withDerivative
            ? 'integrating-lag'
            : 'integrating'
          : withDerivative
            ? 'sopdt'
            : 'fopdt',
      );
      if (!reduced.ok) throw new Error(reduced.message);
      const { k, tau, tau2, thetaS } = reduced.value.model;
      const gain = integrating ? 1 / (k * 2 * thetaS) : (tau as number) / (k * 2 * thetaS);
      expect(gain / recomputed.Kc).toBeCloseTo(1, 6);
      expect(Math.min(tau ?? Infinity, 8 * thetaS)).toBeCloseTo(recomputed.tI, 6);
      if (withDerivative) expect(tau2).toBeCloseTo(recomputed.tD, 6);
    });
  }

  it('SG12-E2, with a numerator factor and an inverse response', () => {
    const example = examples.find((e) => e.id === 'SG12-E2-half-rule-1');
    if (!example) throw new Error('example missing');
    const { num, den, delay } = example.plant;
    const reduced = reducePlant({ num, den, deadTimeS: delay }, 'fopdt');
    expect(reduced.ok && reduced.value.model.tau).toBeCloseTo(2.5, 4);
    expect(reduced.ok && reduced.value.model.thetaS).toBeCloseTo(1.47, 4);
  });
});

describe('recognisePlant on the plants of the rule vectors', () => {
  const shapes: Record<string, (i: Record<string, number>) => [number[], number[], string]> = {
    fopdt: (i) => [[i.K], [i.tau, 1], 'first-order'],
    ipdt: (i) => [[i.K], [1, 0], 'integrator'],
    sopdt: (i) => [[i.K], multiply([i.tau1, 1], [i.tau2, 1]), 'second-order-real'],
    'K e^{-theta s}': (i) => [[i.K], [1], 'gain'],
    'K e^{-theta s}/s^2': (i) => [[i.K], [1, 0, 0], 'double-integrator'],
    'K e^{-theta s}/(s(tau s+1))': (i) => [[i.K], [i.tau, 1, 0], 'integrator-lag'],
    'K e^{-theta s}(T s+1)/(s(tau2 s+1))': (i) => [[i.K * i.T, i.K], [i.tau2, 1, 0], 'integrator-zero-lag'],
    uso: (i) => [
      [i.K],
      [i.tau ** 2, 2 * i.zeta * i.tau, 1],
      i.zeta < 1 ? 'second-order-complex' : 'second-order-real',
    ],
    'K(-beta s+1)/(tau^2 s^2+2 zeta tau s+1)': (i) => [
      [-i.K * i.beta, i.K],
      [i.tau ** 2, 2 * i.zeta * i.tau, 1],
      'second-order-rhp-zero',
    ],
    'K/((T1 s+1)(T2 s+1)(Ts s+1))': (i) => [
      [i.K],
      multiply(multiply([i.T1, 1], [i.T2, 1]), [i.Tsigma, 1]),
      'third-order-real',
    ],
    'K/(s(T1 s+1)(Ts s+1))': (i) => [
      [i.K],
      multiply(multiply([i.T1, 1], [i.Tsigma, 1]), [1, 0]),
      'integrator-two-lags',
    ],
  };
  const rules = JSON.parse(readFileSync(new URL('./rules.json', import.meta.url), 'utf8')).rules as {
    plant: string;
    inputs: Record<string, number>;
  }[];
  for (const [name, build] of Object.entries(shapes)) {
    it(name, () => {
      const found = rules.filter((r) => r.plant === name);
      expect(found.length).toBeGreaterThan(0);
      for (const { inputs } of found) {
        const [num, den, shape] = build(inputs);
        const result = recognisePlant({ num, den, deadTimeS: inputs.theta ?? 0 });
        expect(result.shape).toBe(shape);
        if (result.shape !== 'general') expect(result.k).toBeCloseTo(inputs.K, 12);
        const parameters = Object.values(result).filter((v): v is number => typeof v === 'number');
        for (const name of ['tau', 'tau1', 'tau2', 'zeta', 'beta', 'theta', 'T1', 'T2', 'Tsigma', 'T']) {
          if (inputs[name] === undefined || (name === 'theta' && inputs.theta === 0)) continue;
          // Real poles have no ζ, and τ is the mean of theirs.
          if (/^(zeta|tau)$/.test(name) && shape === 'second-order-real') continue;
          expect(Math.min(...parameters.map((p) => Math.abs(p / inputs[name] - 1)))).toBeLessThan(1e-9);
        }
      }
    });
  }
});
