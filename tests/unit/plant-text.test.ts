import { describe, expect, it } from 'vitest';
import { parsePlantText, plantToText, validatePlant, type Notation } from '../../lib/control/plant-text';
import { evaluateComplex } from '../../lib/control/polynomial';
import type { Plant } from '../../lib/control/types';

/** Expected coefficients are multiplied out by hand. Text, numerator, denominator, dead time in s. */
type Accepted = readonly [string, readonly number[], readonly number[], number?];

const ACCEPTED: Readonly<Record<Notation, readonly Accepted[]>> = {
  coefficients: [
    ['[2420] / [1 118.8 1936]', [2420], [1, 118.8, 1936]],
    ['[2420]/[1,118.8,1936]', [2420], [1, 118.8, 1936]],
    ['[2, 3] / [1; 2; 3]', [2, 3], [1, 2, 3]],
    ['2420\n1 118.8 1936', [2420], [1, 118.8, 1936]],
    ['2420\r\n1\t118.8\t1936\r\n', [2420], [1, 118.8, 1936]],
    ['2 3 / 1 2 3', [2, 3], [1, 2, 3]],
    ['(2 3)/(1 2 3)', [2, 3], [1, 2, 3]],
    ['num: 2 den: 10 1', [2], [10, 1]],
    ['den: 10 1; num: 2; delay: 3', [2], [10, 1], 3],
    ['num = [2]\nden = [10 1]\ndead time: 300 ms', [2], [10, 1], 0.3],
    ['numerator: 2, denominator: 10, 1', [2], [10, 1]],
    ['b = 1 2; a = 1 2 3', [1, 2], [1, 2, 3]],
    ['num 2 / den 10 1', [2], [10, 1]],
    ['[2] / [10 1], delay 3', [2], [10, 1], 3],
    ['[2] / [10 1] θ = 2 min', [2], [10, 1], 120],
    ['[-2e-3] / [+1e2 .5]', [-0.002], [100, 0.5]],
    ['[−2] / [10 1]', [-2], [10, 1]],
    ['[0 0 2] / [0 10 1]', [2], [10, 1]],
    ['num: 1,5; 2,5 den: 1,5 2,5 3', [1.5, 2.5], [1.5, 2.5, 3]],
    ['num: 1,2e-08 den: 1,5 2,5', [1.2e-8], [1.5, 2.5]],
    ['[1,5] / [1,2,3]', [1, 5], [1, 2, 3]],
    ['[1,05] / [10 1]', [1.05], [10, 1]],
    ['  2 3\n------\n1 2 3', [2, 3], [1, 2, 3]],
  ],
  expression: [
    ['1.25*1936/(s^2 + 118.8 s + 1936)', [2420], [1, 118.8, 1936]],
    ['2 e^(-3s)/((10s+1)(5s+1))', [2], [50, 15, 1], 3],
    ['2 exp(-3*s)/((10*s+1)*(5*s+1))', [2], [50, 15, 1], 3],
    ['G(s) = 2·e⁻³ˢ/((10s+1)·(5s+1))', [2], [50, 15, 1], 3],
    ['2/(10s+1) e^(-3s)', [2], [10, 1], 3],
    ['e^(-s/2)/(10s+1)', [1], [10, 1], 0.5],
    ['2/(10s+1)/exp(3s)', [2], [10, 1], 3],
    ['(e^(-s))^2/(s+1)', [1], [1, 1], 2],
    ['e^(-0.1s)·e^(-0.2s)/(s+1) + e^(-0.3s)', [1, 2], [1, 1], 0.1 + 0.2],
    ['1/(s²+2s+1)', [1], [1, 2, 1]],
    ['1/(s+1)³', [1], [1, 3, 3, 1]],
    ['1/(s+1)**2', [1], [1, 2, 1]],
    ['s(s+1)^2/(s+2)^3', [1, 2, 1, 0], [1, 6, 12, 8]],
    ['1/(s (s+1)^2)', [1], [1, 2, 1, 0]],
    ['(1 − s)/(1 + s)', [-1, 1], [1, 1]],
    ['-(s-1)/(s+1)', [-1, 1], [1, 1]],
    ['3 × 2 ÷ (s + 1)', [6], [1, 1]],
    ['1/s + 1/s^2', [1, 1], [1, 0, 0]],
    ['1/(s+1) + 2/(s+2) + 3/(s+1)', [6, 10], [1, 3, 2]],
    ['1/((s+1)(s+2)) - 1/(s+2)', [-1, 0], [1, 3, 2]],
    ['1/(1+1/s)', [1, 0], [1, 1]],
    ['(s+1)^-2', [1], [1, 2, 1]],
    ['1/(10^-3 s+1)', [1], [0.001, 1]],
    ['1/(0.5*s+1)', [1], [0.5, 1]],
    ['1,5/(2,5s+1)', [1.5], [2.5, 1]],
    ['2/[10s+1]/{5s+1}', [2], [50, 15, 1]],
    ['2/(10s+1), delay 3 s', [2], [10, 1], 3],
    ['   2\n-------- \n 10 s + 1', [2], [10, 1]],
    ['          2\nG(s) = ------\n       10 s + 1', [2], [10, 1]],
    ['2 /\n(10s+1)', [2], [10, 1]],
    ['10.*s/(s+1)', [10, 0], [1, 1]],
    ['2 pi/(s+1)', [2 * Math.PI], [1, 1]],
    ['5', [5], [1]],
  ],
  parameters: [
    ['K=1.25 wn=40 zeta=1.5', [2000], [1, 120, 1600]],
    ['K=2 tau=10 theta=3', [2], [10, 1], 3],
    ['K=1 tau1=10 tau2=5 theta=1', [1], [50, 15, 1], 1],
    ['K: 2, τ: 10; θ: 3', [2], [10, 1], 3],
    ['K=2\nτ₁=10\nτ₂=5', [2], [50, 15, 1]],
    ['K=1 ωₙ=2 ζ=0.5', [4], [1, 2, 4]],
    ['Kv=0.2 theta=1', [0.2], [1, 0], 1],
    ['Kv=0.2 tau=4', [0.2], [4, 1, 0]],
    ['K=2 tau=10 tz=-3', [-6, 2], [10, 1]],
    ['K=2,5 tau=10,25', [2.5], [10.25, 1]],
    ['K=2,tau=10,theta=3', [2], [10, 1], 3],
    ['K=-2 tau=10 min dead time=500ms', [-2], [600, 1], 0.5],
    ['K=1,2e-08 T=3', [1.2e-8], [3, 1]],
    ['K=2', [2], [1]],
  ],
  'gain-zeros-poles': [
    ['gain 2; zeros -1; poles -2 -3+4i -3-4i; delay 0.5', [2, 2], [1, 8, 37, 50], 0.5],
    ['k=2 z=[-1] p=[-2, -3±4i]', [2, 2], [1, 8, 37, 50]],
    ['poles: -2, -3 ± 4j; gain: 2', [2], [1, 8, 37, 50]],
    ['gain 2 poles -3 + 4i -3 - 4i', [2], [1, 6, 25]],
    ['gain 2 poles -3+j4 -3-j4', [2], [1, 6, 25]],
    ['gain 2 zeros none poles ±i 0', [2], [1, 0, 1, 0]],
    ['gain 2 poles -1,5; -2', [2], [1, 3.5, 3]],
    ['poles none', [1], [1]],
  ],
  json: [
    ['{"num": [2], "den": [10, 1], "delay": 3}', [2], [10, 1], 3],
    ['{"num": [2], "den": [10, 1], "deadTime": 3}', [2], [10, 1], 3],
    [
      '{"gain": 2, "zeros": [-1], "poles": [-2, {"re": -3, "im": 4}, {"re": -3, "im": -4}]}',
      [2, 2],
      [1, 8, 37, 50],
    ],
    ['{"gain": 2, "poles": ["-3±4i"], "delay": 1}', [2], [1, 6, 25], 1],
    ['{"K": 2, "tau": 10, "theta": 3}', [2], [10, 1], 3],
  ],
};

function read(text: string) {
  const result = parsePlantText(text);
  if (!result.ok) throw new Error(`${text}: ${result.code} ${result.message}`);
  return result.value;
}

describe.each(Object.entries(ACCEPTED))('%s', (notation, given) => {
  const cases = given.map(([text, num, den, deadTimeS = 0]) => ({ text, plant: { num, den, deadTimeS } }));

  it.each(cases)('reads $text', ({ text, plant }) => {
    const parsed = read(text);
    expect(parsed.plant).toEqual(plant);
    expect(parsed.notation).toBe(notation);
  });

  it.each(cases)('writes what $text means as a text that reads back', ({ plant }) => {
    expect(read(plantToText(plant)).plant).toEqual(plant);
  });
});

/** Text, code, and the place in the text; undefined where none can be told. */
const REFUSED: readonly (readonly [string, string, number | undefined])[] = [
  ['', 'EMPTY', 0],
  [' \n\t', 'EMPTY', 0],
  ['num: den: 10 1', 'EMPTY', 0],
  ['s+'.repeat(1001), 'TOO_LONG', 2000],
  ['foo/(s+1)', 'UNKNOWN_SYMBOL', 0],
  ['2/(tau s+1)', 'UNKNOWN_SYMBOL', 3],
  ['2/(S+1)', 'UNKNOWN_SYMBOL', 3],
  ['1/(s2+2s+1)', 'UNKNOWN_SYMBOL', 3],
  ['0x10/(s+1)', 'UNKNOWN_SYMBOL', 1],
  ['2 e/(s+1)', 'UNKNOWN_SYMBOL', 2],
  ['true/(s+1)', 'UNKNOWN_SYMBOL', 0],
  ['sin(s)/(s+1)', 'UNKNOWN_SYMBOL', 0],
  ['K=2 Ti=10', 'UNKNOWN_SYMBOL', 4],
  ['{"num": [2], "den": [10, 1], "dellay": 3}', 'UNKNOWN_SYMBOL', undefined],
  ['2/(s+1', 'UNBALANCED_BRACKET', 2],
  ['2/(s+1))', 'UNBALANCED_BRACKET', 7],
  ['2/(s+1]', 'UNBALANCED_BRACKET', 6],
  ['[2] / [10 1', 'UNBALANCED_BRACKET', 6],
  ['(s^2+1)/(s+1)', 'IMPROPER', 0],
  ['[1 2 3] / [1 2]', 'IMPROPER', 1],
  ['2/3s', 'IMPROPER', 0],
  ['1 - e^(-s)', 'NOT_RATIONAL', 4],
  ['2^s/(s+1)', 'NOT_RATIONAL', 2],
  ['1/(s+1)^0.5', 'NOT_RATIONAL', 8],
  ['e^(-s^2)/(s+1)', 'NOT_RATIONAL', 0],
  ['gain 2 poles -2 -3i', 'NOT_RATIONAL', 16],
  ['gain 2 poles -3+4i', 'NOT_RATIONAL', 13],
  ['e^(3s)/(s+1)', 'NEGATIVE_DEAD_TIME', 0],
  ['2/((s+1) e^(-3s))', 'NEGATIVE_DEAD_TIME', 9],
  ['[2] / [10 1], delay -3', 'NEGATIVE_DEAD_TIME', 20],
  ['K=2 tau=10 theta=-3', 'NEGATIVE_DEAD_TIME', 11],
  ['1/(s+1)^21', 'ORDER_TOO_HIGH', 0],
  ['1/(s+1)^61', 'ORDER_TOO_HIGH', 8],
  ['((s+1)^60)^60', 'ORDER_TOO_HIGH', 11],
  [`poles ${'-1 '.repeat(21)}`, 'ORDER_TOO_HIGH', undefined],
  ['1e999/(s+1)', 'NOT_FINITE', 0],
  ['[1e999] / [1 1]', 'NOT_FINITE', 1],
  ['{"num": [1e999], "den": [1, 1]}', 'NOT_FINITE', undefined],
  ['1/0', 'ZERO_DENOMINATOR', 2],
  ['2/(s-s)', 'ZERO_DENOMINATOR', 3],
  ['[1] / [0 0]', 'ZERO_DENOMINATOR', 7],
  ['0/(s+1)', 'ZERO_PLANT', 0],
  ['[0] / [1 1]', 'ZERO_PLANT', 1],
  ['K=0 tau=1', 'ZERO_PLANT', 0],
  ['[1,5]', 'AMBIGUOUS', 1],
  ['[2,5] / [10 1]', 'AMBIGUOUS', 1],
  ['[1, 2,5] / [1; 2; 3]', 'AMBIGUOUS', 4],
  ['1,5/2,5', 'AMBIGUOUS', 0],
  ['k=2 p=[-2,5]', 'AMBIGUOUS', 7],
  ['K=1,500 tau=3', 'AMBIGUOUS', 2],
  ['1,500/(s+1)', 'AMBIGUOUS', 0],
  ['s 2/(s+1)', 'AMBIGUOUS', 2],
  ['1/(s+1)2', 'AMBIGUOUS', 7],
  ['K=2 K=3', 'AMBIGUOUS', 4],
  ['2 e^(-s)/(s+1), delay 3', 'AMBIGUOUS', 22],
  ['K=2 Kv=3', 'AMBIGUOUS', undefined],
  ['{"K": 2, "delay": 1, "deadTime": 2}', 'AMBIGUOUS', undefined],
  ['2/(s+1)*', 'SYNTAX', 8],
  ['2/*(s+1)', 'SYNTAX', 2],
  ['2//(s+1)', 'SYNTAX', 2],
  ['2/(s+1)--3', 'SYNTAX', 7],
  ['1 2 3', 'SYNTAX', 2],
  ['[1 2 3]', 'SYNTAX', 7],
  ['[1,,2] / [1 2 3]', 'SYNTAX', 3],
  ['[1 x] / [1 2 3]', 'SYNTAX', 3],
  ['2\n10s+1', 'SYNTAX', 2],
  ['2/(s+1); drop', 'SYNTAX', 7],
  ['e^-3s/(s+1)', 'SYNTAX', 0],
  ['"2"/(s+1)', 'SYNTAX', 0],
  ['K=2 tau=abc', 'SYNTAX', 8],
  ['K=2 tau=0', 'SYNTAX', undefined],
  ['tau=10', 'SYNTAX', undefined],
  ['K=1 wn=2', 'SYNTAX', undefined],
  ['gain 2 zeros -1', 'SYNTAX', undefined],
  ['gain 2 poles -1x', 'SYNTAX', 13],
  ['about gain 2 poles -1', 'SYNTAX', 0],
  ['{"num": "2"}', 'SYNTAX', undefined],
];

describe('refusals', () => {
  it.each(REFUSED)('refuses %j', (text, code, at) => {
    const result = parsePlantText(text);
    expect(result).toMatchObject({ ok: false, code });
    if (result.ok) return;
    expect(result.at).toBe(at);
    expect(result.message).toMatch(/^.{20,}[.?]$/s);
  });
});

describe('warnings', () => {
  it.each([
    ['1/2 s/(s+1)', /one factor/],
    ['2/10(s+1)/(s+2)', /one factor/],
    ['2/(10s+1)(5s+1)', /all read as the denominator/],
    ['1/s(s+1)', /all read as the denominator/],
    ['s/(s(s+1))', /root 0 in common/],
    ['(s+0.1)/((10s+1)(s+2))', /root -0.1 in common/],
  ])('says what %j could also mean', (text, sentence) => {
    expect(read(text).warnings.join(' ')).toMatch(sentence);
  });

  it.each(['2/(10s+1) e^(-3s)', '1/2*s/(s+1)', '2/((10s+1)(5s+1))', '10s+1 - 10s', '1/2 e^(-3s)/(s+1)'])(
    'has nothing to say about %j',
    (text) => {
      expect(read(text).warnings).toEqual([]);
    },
  );

  it('repeats the reading of a fraction when it makes the plant improper', () => {
    const result = parsePlantText('2/3s');
    expect(!result.ok && result.message).toMatch(/one factor/);
  });
});

describe('validatePlant', () => {
  it('drops leading zeros and the sign of zero', () => {
    expect(validatePlant([0, -0, 2], [0, 1, -0], -0)).toEqual({
      ok: true,
      value: { num: [2], den: [1, 0], deadTimeS: 0 },
    });
  });

  it.each([
    [[], [1], 0, 'EMPTY'],
    [[NaN], [1], 0, 'NOT_FINITE'],
    [[1e41], [1], 0, 'NOT_FINITE'],
    [[1], [0], 0, 'ZERO_DENOMINATOR'],
    [[0], [1], 0, 'ZERO_PLANT'],
    [[1, 0], [1], 0, 'IMPROPER'],
    [[1], new Array<number>(22).fill(1), 0, 'ORDER_TOO_HIGH'],
    [[1], [1, 1], -1, 'NEGATIVE_DEAD_TIME'],
  ])('refuses %j / %j, dead time %j', (num, den, deadTimeS, code) => {
    expect(validatePlant(num, den, deadTimeS)).toMatchObject({ ok: false, code });
  });
});

function response({ num, den, deadTimeS }: Plant, w: number): [number, number] {
  const [a, b] = evaluateComplex(num, 0, w);
  const [c, d] = evaluateComplex(den, 0, w);
  const size = c * c + d * d;
  const [re, im] = [(a * c + b * d) / size, (b * c - a * d) / size];
  const [cos, sin] = [Math.cos(w * deadTimeS), -Math.sin(w * deadTimeS)];
  return [re * cos - im * sin, re * sin + im * cos];
}

describe('the same plant in every notation', () => {
  // 1.25·44²/(s² + 2·1.35·44 s + 44²)·e^(-0.02 s); the poles are -59.4 ± √(59.4² - 1936) = -99.3…, -19.49….
  const root = Math.sqrt(59.4 ** 2 - 1936);
  const texts = [
    '[2420] / [1 118.8 1936], delay 20 ms',
    '1.25*1936 e^(-0.02s)/(s^2 + 118.8 s + 1936)',
    `2420 exp(-0.02 s)/((s + ${59.4 + root})(s + ${59.4 - root}))`,
    'K=1.25 wn=44 zeta=1.35 theta=0.02',
    `gain 2420; poles ${-59.4 - root}, ${-59.4 + root}; delay 0.02`,
    '{"num": [2420], "den": [1, 118.8, 1936], "delay": 0.02}',
  ];

  it.each(texts)('%s has the same frequency response to 1e-9', (text) => {
    for (let exponent = -3; exponent <= 4; exponent += 0.25) {
      const w = 10 ** exponent;
      const [re, im] = response(read(text).plant, w);
      const [re0, im0] = response({ num: [2420], den: [1, 118.8, 1936], deadTimeS: 0.02 }, w);
      expect(Math.hypot(re - re0, im - im0)).toBeLessThanOrEqual(1e-9 * Math.hypot(re0, im0));
    }
  });
});
