import { describe, expect, it } from 'vitest';
import { canonicalText, CAUTIONS, diffValues } from '../../lib/change';

describe('canonicalText', () => {
  it('reproduces the published samples of RFC 8785', () => {
    // Section 3.2.2 with 3.2.3: serialisation of literals, numbers and strings, properties sorted (sample from memory).
    const sample: unknown = JSON.parse(
      '{"numbers":[333333333.33333329,1E30,4.50,2e-3,0.000000000000000000000000001],' +
        '"string":"\\u20ac$\\u000F\\u000aA\'\\u0042\\u0022\\u005c\\\\\\"\\/","literals":[null,true,false]}',
    );
    expect(canonicalText(sample)).toBe(
      '{"literals":[null,true,false],"numbers":[333333333.3333333,1e+30,4.5,0.002,1e-27],' +
        '"string":"€$\\u000f\\nA\'B\\"\\\\\\\\\\"/"}',
    );
    // Section 3.2.3: keys in order of their UTF-16 code units (sample from memory).
    const keys = { '\u20ac': 1, '\r': 2, '\ufb33': 3, '1': 4, '\ud83d\ude00': 5, '\u0080': 6, '\u00f6': 7 };
    expect([...canonicalText(keys).matchAll(/:(\d)/g)].map(([, digit]) => digit).join('')).toBe('2467153');
  });

  it('does not depend on the order of keys, nor on undefined ones', () => {
    expect(canonicalText({ b: 1, a: { d: [1, { y: 2, x: 1 }], c: undefined } })).toBe(
      '{"a":{"d":[1,{"x":1,"y":2}]},"b":1}',
    );
    expect(canonicalText({ a: { d: [1, { x: 1, y: 2 }] }, b: 1 })).toBe(
      canonicalText({ b: 1, a: { d: [1, { y: 2, x: 1 }] } }),
    );
  });

  it('writes the infinite as the public API does and knows one zero', () => {
    expect(canonicalText([Infinity, -Infinity, -0, 0.1 + 0.2])).toBe('["inf","-inf",0,0.30000000000000004]');
    expect(canonicalText(new Float64Array([1.5, Infinity]))).toBe('[1.5,"inf"]');
  });

  it('refuses what has no one text, with its place', () => {
    const loop: Record<string, unknown> = {};
    loop.self = loop;
    expect(() => canonicalText({ gains: { kp: NaN } })).toThrow('$.gains.kp is not a number');
    expect(() => canonicalText({ at: new Date(0) })).toThrow('$.at is a Date');
    expect(() => canonicalText([1, undefined])).toThrow('$[1] is undefined');
    expect(() => canonicalText(loop)).toThrow('$.self contains itself');
    expect(() => canonicalText({ a: 10n })).toThrow('$.a is bigint');
    expect(() => canonicalText('\ud800')).toThrow('half a Unicode character');
  });
});

describe('diffValues', () => {
  it('names what differs, deep, with labels', () => {
    const before = {
      controller: { kp: 1, ti: Infinity, td: 0 },
      plant: { num: [1, 2] },
      gone: 'x',
      same: null,
    };
    const after = {
      controller: { kp: 2, ti: Infinity, td: -0 },
      plant: { num: [1, 3] },
      same: null,
      fresh: true,
    };
    expect(diffValues(before, after, { 'controller.kp': 'Gain' })).toEqual([
      { path: 'controller.kp', label: 'Gain', from: 1, to: 2 },
      { path: 'plant.num', from: [1, 2], to: [1, 3] },
      { path: 'gone', from: 'x', to: undefined },
      { path: 'fresh', from: undefined, to: true },
    ]);
  });

  it('compares lists of objects item by item', () => {
    const before = { cases: [{ name: 'empty', den: [1, 1] }] };
    const after = {
      cases: [
        { name: 'full', den: [1, 1] },
        { name: 'hot', den: [1, 2] },
      ],
    };
    expect(diffValues(before, after)).toEqual([
      { path: 'cases[0].name', from: 'empty', to: 'full' },
      { path: 'cases[1]', from: undefined, to: { name: 'hot', den: [1, 2] } },
    ]);
    expect(diffValues(before, structuredClone(before))).toEqual([]);
  });
});

describe('cautions', () => {
  it('are short sentences with keys of their own, and say that the model is linear', () => {
    expect(new Set(CAUTIONS.map(({ key }) => key)).size).toBe(CAUTIONS.length);
    for (const { text } of CAUTIONS) expect(text).toMatch(/^[A-Z].{20,150}\.$/);
    expect(CAUTIONS.some(({ text }) => text.startsWith('Fettle computes with a linear model'))).toBe(true);
  });
});
