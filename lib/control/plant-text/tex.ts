import { roundSignificant } from '../../units/round';
import { trimmed, type Polynomial } from '../polynomial';
import type { Plant } from '../types';

/** Powers of ten within which a number is written out, as lib/units does. */
const PLAIN_FROM = 1e-5;
const PLAIN_BELOW = 1e7;
const SIGNIFICANT = 6;

/** The size of a number in TeX: 118.8, or 1.2\times10^{-8} where it is very small or large. */
function sizeToTex(value: number, significant: number): string {
  const size = Math.abs(roundSignificant(value, significant));
  if (size === 0 || (size >= PLAIN_FROM && size < PLAIN_BELOW)) {
    const [mantissa, exponent = '0'] = String(size).split('e');
    return exponent === '0'
      ? mantissa
      : size.toFixed((mantissa.split('.')[1] ?? '').length - Number(exponent));
  }
  const [mantissa, exponent] = size.toExponential().split('e');
  const power = `10^{${Number(exponent)}}`;
  return mantissa === '1' ? power : `${mantissa}\\times${power}`;
}

function powerToTex(power: number): string {
  if (power === 0) return '';
  if (power === 1) return 's';
  return power < 10 ? `s^${power}` : `s^{${power}}`;
}

/**
 * A polynomial in TeX, descending powers, terms with coefficient 0 left out: `s^2+118.8\,s+1936`.
 *
 * @param significant digits of each coefficient, 1 to 17; default 6
 */
export function polynomialToTex(p: Polynomial, significant = SIGNIFICANT): string {
  const terms = p.flatMap((coefficient, i) => {
    if (coefficient === 0) return [];
    const power = powerToTex(p.length - 1 - i);
    const size = sizeToTex(coefficient, significant);
    const sign = coefficient < 0 ? '-' : '+';
    if (power === '') return [sign + size];
    return [size === '1' ? sign + power : `${sign}${size}\\,${power}`];
  });
  return terms.length === 0 ? '0' : terms.join('').replace(/^\+/, '');
}

function deadTimeToTex(deadTimeS: number, significant: number): string {
  const size = sizeToTex(deadTimeS, significant);
  if (size === '1') return 'e^{-s}';
  return size.includes('10^') ? `e^{-${size}\\,s}` : `e^{-${size}s}`;
}

/**
 * A plant in TeX for a formula on the page: `\frac{2420}{s^2+118.8\,s+1936}\,e^{-3s}`. Rounded for reading;
 * plantToText keeps every digit.
 *
 * @param significant digits of each number, 1 to 17; default 6
 */
export function plantToTex({ num, den, deadTimeS }: Plant, significant = SIGNIFICANT): string {
  const top = polynomialToTex(num, significant);
  const bottom = polynomialToTex(den, significant);
  const deadTime = deadTimeS > 0 ? deadTimeToTex(deadTimeS, significant) : '';
  if (bottom !== '1') return `\\frac{${top}}{${bottom}}${deadTime && `\\,${deadTime}`}`;
  if (!deadTime) return top;
  if (top === '1') return deadTime;
  const several = trimmed(num).filter((c) => c !== 0).length > 1;
  return `${several ? `\\left(${top}\\right)` : top}\\,${deadTime}`;
}
