import fc from 'fast-check';
import { afterAll, describe, expect, it } from 'vitest';
import { parsePlantText, plantToText } from '../../lib/control/plant-text';
import type { Plant } from '../../lib/control/types';

const RUNS = 10_000;
/** A guard against hanging, not a speed limit: the machine may be busy. */
const HANGING_MS = 1000;

let slowest = { ms: 0, text: '' };

/** Parses within the guard, and checks that the answer is a plant or a refusal that points into the text. */
function readable(text: string): boolean {
  const begin = performance.now();
  const result = parsePlantText(text);
  const ms = performance.now() - begin;
  if (ms > slowest.ms) slowest = { ms, text };
  expect(ms).toBeLessThan(HANGING_MS);
  if (!result.ok) {
    expect(result.message.length).toBeGreaterThan(10);
    if (result.at !== undefined) {
      expect(result.at).toBeGreaterThanOrEqual(0);
      expect(result.at).toBeLessThanOrEqual(text.length);
    }
    return false;
  }
  const { num, den, deadTimeS } = result.value.plant;
  expect([...num, ...den, deadTimeS].every(Number.isFinite)).toBe(true);
  expect(num.length).toBeLessThanOrEqual(den.length);
  expect(num[0] !== 0 && den[0] !== 0 && deadTimeS >= 0).toBe(true);
  expect(parsePlantText(plantToText(result.value.plant))).toMatchObject({
    ok: true,
    value: { plant: result.value.plant },
  });
  return true;
}

afterAll(() => {
  console.log(`slowest parse: ${slowest.ms.toFixed(1)} ms for ${JSON.stringify(slowest.text.slice(0, 80))}`);
});

/** What plants are written with, and what comes near it. */
const PIECES = [
  ...'0123456789.,;:=+-*/^()[]{}\n\t "±−·×²³⁻ˢτθζω∞eEijspKk',
  ' ',
  ' ',
  's',
  's',
  '(s+1)',
  '(10s+1)',
  '/(',
  's^2',
  'e^(-3s)',
  'exp(-2*s)',
  '^2',
  '^-1',
  '1e9',
  '1e-300',
  '1/0',
  'num:',
  'den:',
  'delay',
  'dead time: 3',
  'K=2',
  'Kv=',
  'tau=10',
  'theta=1',
  'wn=44',
  'zeta=',
  'gain 2',
  'zeros',
  'poles',
  '-3±4i',
  '-3+4i',
  '[1 2 3]',
  '[2]',
  '{"num":[1],',
  '"den":[1,2]}',
  '1,5',
  'G(s) =',
  '-----',
  '0x1',
  'true',
  'constructor',
  '__proto__',
  'NaN',
  'Infinity',
  'import',
  ' mod ',
  ' to ',
  '!',
  "'",
  '.*',
  '->',
  '?.',
];

const VALID = [
  '[2420] / [1 118.8 1936], delay 3',
  'num: 1,5; 2,5 den: 1 2,5 3 delay: 300 ms',
  '2 e^(-3s)/((10s+1)(5s+1))',
  '1.25*1936/(s^2 + 118.8 s + 1936) + 1/s',
  'G(s) = 2·e⁻³ˢ/(s²+2s+1)³',
  'K=1.25 wn=44 zeta=1.35 theta=0.02',
  'gain 2; zeros -1; poles -2 -3+4i -3-4i; delay 0.5',
  '{"num": [2], "den": [10, 1], "delay": 3}',
  '  2\n-----\n10 s+1',
];

/** A valid text with a few characters taken out, doubled or exchanged. */
const almostValid = fc
  .tuple(
    fc.constantFrom(...VALID),
    fc.array(fc.tuple(fc.nat(200), fc.nat(2), fc.constantFrom(...PIECES)), { maxLength: 4 }),
  )
  .map(([text, edits]) =>
    edits.reduce((edited, [place, removed, piece]) => {
      const at = place % (edited.length + 1);
      return edited.slice(0, at) + piece + edited.slice(at + removed);
    }, text),
  );

describe('reading any text', () => {
  it('never throws or hangs on unicode', () => {
    fc.assert(
      fc.property(fc.string({ unit: 'binary', maxLength: 300 }), (text) => void readable(text)),
      { numRuns: RUNS },
    );
  });

  it('never throws or hangs on pieces of plants', () => {
    const pieces = fc.array(fc.constantFrom(...PIECES), { maxLength: 60 }).map((list) => list.join(''));
    fc.assert(
      fc.property(pieces, (text) => void readable(text)),
      { numRuns: RUNS },
    );
  });

  it('never throws or hangs on almost valid texts, some of which are valid', () => {
    let read = 0;
    fc.assert(
      fc.property(almostValid, (text) => void (read += Number(readable(text)))),
      { numRuns: RUNS },
    );
    expect(read).toBeGreaterThan(RUNS / 20);
  });

  it.each([
    ...[
      '(',
      ')',
      '-',
      '+-',
      '- ',
      's^',
      's ',
      '1/',
      '1/2 ',
      '(s+1)',
      '1/(s+1)+',
      '2^',
      'e^(',
      'exp(',
      '1,',
      '1 ',
      ' ',
      '[',
      '{',
      '\n',
      '- -',
      's+',
      '(1/',
      'num:',
      'K=1 ',
      'p=',
      '±',
      '⁻',
      '.',
    ].map((piece) => piece.repeat(Math.floor(2000 / piece.length))),
    `2${' '.repeat(1990)}x`,
    ...[' ', '\t', '\n', ', ', '1', '1,', '_'].flatMap((fill) =>
      [
        '',
        ' delay',
        '1 delay:',
        '[1] / [2 1] delay ',
        'num:1 den:',
        'b=1 a',
        'K=1 dead time',
        'poles 1',
        '2\n-',
      ].map((before) => `${(before + fill.repeat(2000)).slice(0, 1990)}x`),
    ),
    `1/(${'s('.repeat(59)}1${')'.repeat(59)})`,
    `${'('.repeat(60)}s${')'.repeat(60)}^60`,
    `1/(s+1)^20${'*(s+1)/(s+1)'.repeat(160)}`,
    `[${'1 '.repeat(990)}]`,
    `poles ${'-1 '.repeat(660)}`,
    `poles ${'1±2i '.repeat(390)}`,
    `{"num":${'['.repeat(1990)}`,
    '9^9^9^9^9^9',
    '(((((2^60)^60)^60)^60)^60)/(s+1)',
  ])('answers soon to the text %#', (text) => {
    readable(text);
  });
});

describe('a plant written as a text', () => {
  const size = fc
    .tuple(fc.double({ min: -38, max: 38, noNaN: true }), fc.constantFrom(1, -1))
    .map(([exponent, sign]) => sign * 10 ** exponent);
  const coefficient = fc.oneof({ weight: 5, arbitrary: size }, { weight: 1, arbitrary: fc.constant(0) });
  const plants = fc
    .tuple(
      size,
      fc.array(coefficient, { maxLength: 20 }),
      size,
      fc.array(coefficient, { maxLength: 20 }),
      size,
    )
    .map(([b0, b, a0, a, time]): Plant => {
      const den = [a0, ...a];
      return { num: [b0, ...b].slice(0, den.length), den, deadTimeS: Math.max(0, time) };
    });

  it('reads back to exactly the same plant', () => {
    fc.assert(
      fc.property(plants, (plant) => {
        const text = plantToText(plant);
        expect(parsePlantText(text)).toMatchObject({ ok: true, value: { plant, notation: 'coefficients' } });
      }),
      { numRuns: 2000 },
    );
  });
});
