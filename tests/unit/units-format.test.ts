/**
 * Writing of numbers after the SI brochure (BIPM, 9th edition, section 5.4: a space between number and unit, none before
 * the degree sign of an angle, leading zero; from memory); safe-number habits are common practice.
 */
import { describe, expect, it } from 'vitest';
import {
  decimalsOfStep,
  formatNumber,
  formatQuantity,
  formatTimeS,
  roundSignificant,
  roundToStep,
} from '../../lib/units';

describe('formatNumber', () => {
  it.each([
    [0, '0'],
    [-0, '0'],
    [0.5, '0.5'],
    [-2.4, '−2.4'],
    [2, '2'],
    [1234.567, '1235'],
    [123456, '123500'],
    [0.000123456, '0.0001235'],
    [0.0000123456, '0.00001235'],
    [1.2e-7, '1.2·10⁻⁷'],
    [-1.2e-7, '−1.2·10⁻⁷'],
    [9999999, '1·10⁷'],
    [1.5e12, '1.5·10¹²'],
    [Infinity, '∞'],
    [-Infinity, '−∞'],
    [NaN, '–'],
  ])('%f is %s', (value, text) => {
    expect(formatNumber(value)).toBe(text);
  });

  it('keeps the decimals of a device and never shows a minus before zero', () => {
    expect(formatNumber(0.5, { decimals: 2 })).toBe('0.50');
    expect(formatNumber(-0.001, { decimals: 2 })).toBe('0.00');
    expect(formatNumber(1e8, { decimals: 1 })).toBe('100000000.0');
    expect(formatNumber(Math.PI, { significant: 6 })).toBe('3.14159');
    expect(formatNumber('inf')).toBe('∞');
    expect(formatNumber(null)).toBe('–');
  });
});

describe('formatQuantity', () => {
  it.each([
    [85, '°C', '85 °C'],
    [45, '°', '45°'],
    [30, '°/s', '30°/s'],
    [4, 'bar', '4 bar'],
    [-3, '%', '−3 %'],
    [2, '', '2'],
    [Infinity, 's', '∞ s'],
  ])('%f %s', (value, unit, text) => {
    expect(formatQuantity(value, unit)).toBe(text);
  });
});

describe('formatTimeS', () => {
  it.each([
    [0, '0 s'],
    [1.8e-6, '1.8 µs'],
    [0.00098765, '988 µs'],
    [0.0009999, '1 ms'],
    [0.187, '187 ms'],
    [0.99996, '1 s'],
    [1.5, '1.5 s'],
    [119.4, '119 s'],
    [119.7, '2 min'],
    [600, '10 min'],
    [7200, '2 h'],
    [190000, '52.8 h'],
    [-0.25, '−250 ms'],
    [Infinity, '∞ s'],
  ])('%f s is %s', (seconds, text) => {
    expect(formatTimeS(seconds)).toBe(text);
  });

  it('shows what is not defined as such', () => {
    expect(formatTimeS(null)).toBe('–');
    expect(formatTimeS('inf')).toBe('∞ s');
  });
});

describe('rounding', () => {
  it('goes to the nearest multiple, halves away from zero, without crumbs', () => {
    expect(roundToStep(0.3, 0.1)).toBe(0.3);
    expect(roundToStep(1.005, 0.01)).toBe(1.01);
    expect(roundToStep(-1.005, 0.01)).toBe(-1.01);
    expect(roundToStep(7, 5)).toBe(5);
    expect(roundToStep(0.00049, 0.001)).toBe(0);
    expect(Object.is(roundToStep(-0.0001, 0.001), 0)).toBe(true);
    expect(roundToStep(Infinity, 1)).toBe(Infinity);
    expect(() => roundToStep(1, 0)).toThrow(RangeError);
  });

  it('keeps significant digits', () => {
    expect(roundSignificant(0.0012345, 3)).toBe(0.00123);
    expect(roundSignificant(-98765, 2)).toBe(-99000);
    expect(() => roundSignificant(1, 0)).toThrow(RangeError);
  });

  it('knows the decimals of a step', () => {
    expect([0.05, 1, 5, 0.001, 1e-7, 2.5e-7, 1e3].map(decimalsOfStep)).toEqual([2, 0, 0, 3, 7, 8, 0]);
  });
});
