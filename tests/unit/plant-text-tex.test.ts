import { describe, expect, it } from 'vitest';
import { plantToTex, polynomialToTex } from '../../lib/control/plant-text';
import type { Plant } from '../../lib/control/types';

/** Expected TeX written by hand after the usual setting of transfer functions (common practice). */
describe('polynomialToTex', () => {
  it.each([
    [[2420], '2420'],
    [[1, 118.8, 1936], String.raw`s^2+118.8\,s+1936`],
    [[-1, 0, -1], '-s^2-1'],
    [[1, 0], 's'],
    [[-2.5, 0], String.raw`-2.5\,s`],
    [[1, ...new Array<number>(10).fill(0)], 's^{10}'],
    [[0, 0], '0'],
    [[1.2e-8, 1e9], String.raw`1.2\times10^{-8}\,s+10^{9}`],
    [[0.00012, 1e-5, -1e-6], String.raw`0.00012\,s^2+0.00001\,s-10^{-6}`],
    [[0.1 + 0.2, 1 / 3], String.raw`0.3\,s+0.333333`],
    [[9999999.9], '10^{7}'],
    [[1234567], '1234570'],
  ])('%j', (p, tex) => {
    expect(polynomialToTex(p)).toBe(tex);
  });

  it('takes the number of digits', () => {
    expect(polynomialToTex([1 / 3, 2 / 3], 3)).toBe(String.raw`0.333\,s+0.667`);
    expect(() => polynomialToTex([1], 0)).toThrow(RangeError);
  });
});

describe('plantToTex', () => {
  const plant = (num: number[], den: number[], deadTimeS = 0): Plant => ({ num, den, deadTimeS });

  it.each([
    [plant([2420], [1, 118.8, 1936], 3), String.raw`\frac{2420}{s^2+118.8\,s+1936}\,e^{-3s}`],
    [plant([2], [10, 1]), String.raw`\frac{2}{10\,s+1}`],
    [plant([1], [1, 0], 1), String.raw`\frac{1}{s}\,e^{-s}`],
    [plant([2], [1], 0.5), String.raw`2\,e^{-0.5s}`],
    [plant([1], [1], 3), 'e^{-3s}'],
    [plant([5], [1]), '5'],
    [plant([2], [4]), String.raw`\frac{2}{4}`],
    [plant([-1, 1], [1, 1], 2e-6), String.raw`\frac{-s+1}{s+1}\,e^{-2\times10^{-6}\,s}`],
  ])('%j', (given, tex) => {
    expect(plantToTex(given)).toBe(tex);
  });
});
