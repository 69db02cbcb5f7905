import { describe, expect, it } from 'vitest';
import { parsePlantText } from '../../lib/control/plant-text';

/**
 * Texts that could be read in two ways: each is read with a sentence that says how, or refused; never one of them in
 * silence. Coefficients are those in the text, or multiplied out by hand as the comments show.
 */
describe('texts read with a sentence that says how', () => {
  it.each([
    // 2/10.1 would be a plant without any motion.
    ['[2]/[10,1]', [2], [10, 1], 0, /“10,1” is read as two numbers/],
    ['[1,5] / [10,1]', [1, 5], [10, 1], 0, /“1,5” is read as two numbers/],
    ['2420 / 1 118,8 1936', [2420], [1, 118.8, 1936], 0, /“118,8” is read as 118\.8/],
    ['1,2 3,4 / 1 2,5 3', [1.2, 3.4], [1, 2.5, 3], 0, /“1,2” is read as 1\.2/],
    ['2e-3s/(10s+1)', [0.002, 0], [10, 1], 0, /“2e-3” is read as a number.*2 e\^\(-3 s\)/],
    // 2/(e^(3 s) (s + 1)) = 2 e^(-3 s)/(s + 1)
    ['2/e^(3s)(s+1)', [2], [1, 1], 3, /all read as the denominator/],
  ])('%j', (text, num, den, deadTimeS, sentence) => {
    const result = parsePlantText(text);
    expect(result).toMatchObject({ ok: true, value: { plant: { num, den, deadTimeS } } });
    if (result.ok) expect(result.value.warnings.join(' ')).toMatch(sentence);
  });
});

describe('texts of one meaning, read without a word', () => {
  it.each([
    ['P = 2/(10s+1)', [2], [10, 1], 0],
    ['P=2 e^(-3s)/(10s+1)', [2], [10, 1], 3],
    ['Y(s)/U(s) = 2/(10s+1)', [2], [10, 1], 0],
    ['G = 2', [2], [1], 0],
    ['2420 / 1; 118,8; 1936', [2420], [1, 118.8, 1936], 0],
    ['2420\n1\t118,8\t1936', [2420], [1, 118.8, 1936], 0],
    ['[1,118.8, 1936] / [1, 2, 3]', [1, 118.8, 1936], [1, 2, 3], 0],
    ['2e-3 s/(10s+1)', [0.002, 0], [10, 1], 0],
    ['2/(10s+1)   e^(-3s)', [2], [10, 1], 3],
    ['P=[-2 -3] K=1', [1], [1, 5, 6], 0],
  ])('%j', (text, num, den, deadTimeS) => {
    expect(parsePlantText(text)).toMatchObject({
      ok: true,
      value: { plant: { num, den, deadTimeS }, warnings: [] },
    });
  });
});

describe('texts refused because no reading is the usual one', () => {
  it.each([
    ['[1,5; 2.5] / [1; 2; 3]', 'AMBIGUOUS', 1],
    ['[1,5 2.5] / [1 2 3]', 'AMBIGUOUS', 1],
    ['poles -1,5; -2.5', 'AMBIGUOUS', 6],
    // A name that no plant has is no plant of gain 3.
    ['Tu=3', 'UNKNOWN_SYMBOL', 0],
    ['foo = 2', 'UNKNOWN_SYMBOL', 0],
    // The dead time behind the fraction is an advance; the one in brackets is one, too.
    ['1/(s+1) e^(2s)', 'NEGATIVE_DEAD_TIME', 8],
    ['1/(s e^(-2s)) e^(-3s)', 'NEGATIVE_DEAD_TIME', 14],
  ])('%j', (text, code, at) => {
    expect(parsePlantText(text)).toMatchObject({ ok: false, code, at });
  });
});

describe('places', () => {
  it('points into the typed text whatever blanks stand in it', () => {
    expect(parsePlantText('2/(10s   +\t\t  x)')).toMatchObject({ ok: false, at: 14 });
    expect(parsePlantText('\n\n  num:  2 \n\n\n den:   10  y')).toMatchObject({ ok: false, at: 27 });
  });
});
