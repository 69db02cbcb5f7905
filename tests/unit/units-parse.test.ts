import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { formatNumber, formatQuantity, parseNumber } from '../../lib/units';

/** Ways of writing met in exports, manuals and by hand: common practice. */
describe('parseNumber', () => {
  it.each([
    ['2.4', 2.4],
    ['2,4', 2.4],
    ['  2.4  ', 2.4],
    ['−2.4', -2.4],
    ['- 2,4', -2.4],
    ['–2.4', -2.4],
    ['+3', 3],
    ['.5', 0.5],
    ['-,5', -0.5],
    ['5.', 5],
    ['0,234', 0.234],
    ['1.234', 1.234],
    ['12,34', 12.34],
    ['1234,567', 1234.567],
    ['1,2e-08', 1.2e-8],
    ['1.2E3', 1200],
    ['1.2·10⁻⁷', 1.2e-7],
    ['1.2×10^-7', 1.2e-7],
    ['85 °C', 85],
    ['85°C', 85],
    ['0.5 1/s', 0.5],
    ['50 %', 50],
    ['3 % per °C', 3],
    ['9.81 m/s2', 9.81],
    ['9.81 m/s^2', 9.81],
    ['Kp = 2.4', 2.4],
    ['Ti: 90 s', 90],
    ['-0', 0],
    ['1.5\u00a0min', 1.5],
  ])('reads "%s"', (text, value) => {
    const parsed = parseNumber(text);
    expect(parsed.ok ? parsed.value : parsed.message).toBe(value);
    expect(Object.is(parsed.ok && parsed.value, -0)).toBe(false);
  });

  it.each([
    ['', 'EMPTY'],
    ['   ', 'EMPTY'],
    ['1,234', 'AMBIGUOUS'],
    ['12,345 s', 'AMBIGUOUS'],
    ['1,234.5', 'AMBIGUOUS'],
    ['1.234.567', 'AMBIGUOUS'],
    ['1 234', 'AMBIGUOUS'],
    ["1'234", 'AMBIGUOUS'],
    ['abc', 'NOT_A_NUMBER'],
    ['-', 'NOT_A_NUMBER'],
    ['1/3', 'NOT_A_NUMBER'],
    ['2-3', 'NOT_A_NUMBER'],
    ['1O.5', 'NOT_A_NUMBER'],
    ['1O5', 'NOT_A_NUMBER'],
    ['O.5', 'NOT_A_NUMBER'],
    ['1e', 'NOT_A_NUMBER'],
    ['x5', 'NOT_A_NUMBER'],
    ['2.4 2.5', 'AMBIGUOUS'],
    ['1e999', 'NOT_A_NUMBER'],
    ['NaN', 'NOT_A_NUMBER'],
    ['inf', 'INFINITE'],
    ['∞', 'INFINITE'],
    ['off', 'OFF'],
  ])('refuses "%s" with %s', (text, code) => {
    const parsed = parseNumber(text);
    expect(parsed.ok ? parsed.value : parsed.code).toBe(code);
    if (!parsed.ok) expect(parsed.message).toMatch(/\.$/);
  });

  it('says both readings of an ambiguous number', () => {
    const parsed = parseNumber('1,234');
    expect(parsed.ok || parsed.message).toBe('"1,234" can be read in two ways; enter 1.234 or 1234.');
  });

  it('takes infinity and off where they are allowed', () => {
    expect(parseNumber('∞ s', { allowInfinity: true })).toEqual({ ok: true, value: Infinity });
    expect(parseNumber('-Inf', { allowInfinity: true })).toEqual({ ok: true, value: -Infinity });
    expect(parseNumber('Off', { offValue: 0 })).toEqual({ ok: true, value: 0 });
    expect(parseNumber('off', { offValue: Infinity })).toEqual({ ok: true, value: Infinity });
  });

  it('refuses another unit than the one expected', () => {
    expect(parseNumber('1.5 min', { unit: 's' })).toMatchObject({ ok: false, code: 'UNIT_MISMATCH' });
    expect(parseNumber('90 s', { unit: 's' })).toEqual({ ok: true, value: 90 });
    expect(parseNumber('2 % per °C', { unit: '% per °C' })).toEqual({ ok: true, value: 2 });
    expect(parseNumber('90', { unit: 's' })).toEqual({ ok: true, value: 90 });
  });

  it('reads back what the formatter writes', () => {
    const values = fc.double({ noNaN: true, noDefaultInfinity: true, min: -1e15, max: 1e15 });
    fc.assert(
      fc.property(values, fc.constantFrom('', 's', '°', '°C', '% per °C', '1/s'), (value, unit) => {
        const rounded = Number(value.toPrecision(6));
        const parsed = parseNumber(formatQuantity(value, unit, { significant: 6 }), { unit });
        return parsed.ok && Math.abs(parsed.value - rounded) <= 1e-15 * Math.abs(rounded);
      }),
      { numRuns: 5000 },
    );
    expect(parseNumber(formatNumber(-1.25e-9))).toEqual({ ok: true, value: -1.25e-9 });
  });

  it('never throws and never answers a number that is not finite', () => {
    fc.assert(
      fc.property(fc.string({ unit: 'binary' }), (text) => {
        const parsed = parseNumber(text);
        return parsed.ok ? Number.isFinite(parsed.value) : parsed.message.length > 0;
      }),
      { numRuns: 5000 },
    );
  });
});
