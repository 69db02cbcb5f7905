import { ok, refuse } from '../../result';
import { add, isZero, multiply, scale, trimmed, type Polynomial } from '../polynomial';
import type { TextResult } from './types';

/** A product of polynomials, kept apart so that sums find the factors that their denominators share. */
type Factors = readonly Polynomial[];

/** num/den · e^(-deadTimeS·s) while an expression is being worked out. */
export interface Rational {
  readonly num: Factors;
  readonly den: Factors;
  readonly deadTimeS: number;
}

/** Degrees may rise for a while before they are judged, but not without end. */
const LARGEST_DEGREE = 60;
/** Dead times that differ by rounding alone: 0.1 + 0.2 and 0.3. */
const SAME_TIME = 1e-12;

export function constant(value: number): Rational {
  return { num: [[value]], den: [], deadTimeS: 0 };
}

export const S: Rational = { num: [[1, 0]], den: [], deadTimeS: 0 };

export function expanded(factors: Factors): number[] {
  return trimmed(factors.reduce<number[]>((product, factor) => multiply(product, factor), [1]));
}

function degreeOf(factors: Factors): number {
  return factors.reduce((degree, factor) => degree + factor.length - 1, 0);
}

export function isZeroRational({ num }: Rational): boolean {
  return num.some(isZero);
}

/** The number that a rational stands for; null when it holds s. */
export function numberOf({ num, den, deadTimeS }: Rational): number | null {
  const [top, bottom] = [expanded(num), expanded(den)];
  return top.length === 1 && bottom.length === 1 && deadTimeS === 0 ? top[0] / bottom[0] : null;
}

/** The product of two products; its numbers become one factor. */
function joined(a: Factors, b: Factors): Factors {
  const all = [...a, ...b];
  const number = all.reduce((product, factor) => (factor.length === 1 ? product * factor[0] : product), 1);
  const others = all.filter((factor) => factor.length > 1);
  return number === 1 ? others : [[number], ...others];
}

function sized(value: Rational): TextResult<Rational> {
  if (Math.max(degreeOf(value.num), degreeOf(value.den)) > LARGEST_DEGREE)
    return refuse(
      'ORDER_TOO_HIGH',
      'The powers of s multiply to an order far above 20. Reduce the plant first.',
    );
  if (!value.num.every((factor) => factor.every(Number.isFinite)) || !Number.isFinite(value.deadTimeS))
    return refuse('NOT_FINITE', 'A coefficient grows beyond what can be computed with.');
  return ok(value);
}

function same(a: Polynomial, b: Polynomial): boolean {
  return a.length === b.length && a.every((c, i) => c === b[i]);
}

/** The factors of `a` that `b` lacks. */
function lacking(a: Factors, b: Factors): Factors {
  const left = [...b];
  return a.filter((factor) => {
    const partner = left.findIndex((other) => same(factor, other));
    if (partner >= 0) left.splice(partner, 1);
    return partner < 0;
  });
}

/** A sum over the least common denominator, as far as the factors show it: 1/s + 1/s^2 is (s+1)/s^2. */
export function sum(a: Rational, b: Rational): TextResult<Rational> {
  if (isZeroRational(a)) return ok(b);
  if (isZeroRational(b)) return ok(a);
  const { deadTimeS } = a;
  if (Math.abs(deadTimeS - b.deadTimeS) > SAME_TIME * Math.abs(deadTimeS))
    return refuse(
      'NOT_RATIONAL',
      'Two terms with different dead times are added; that is no single plant with one dead time.',
    );
  const forA = lacking(b.den, a.den);
  const forB = lacking(a.den, b.den);
  const num = trimmed(add(expanded([...a.num, ...forA]), expanded([...b.num, ...forB])));
  return sized({ num: [num], den: joined(a.den, forA), deadTimeS });
}

export function negative(a: Rational): Rational {
  if (a.num.length !== 1) return { ...a, num: joined([[-1]], a.num) };
  return { ...a, num: [scale(a.num[0], -1)] };
}

export function product(a: Rational, b: Rational): TextResult<Rational> {
  return sized({
    num: joined(a.num, b.num),
    den: joined(a.den, b.den),
    deadTimeS: a.deadTimeS + b.deadTimeS,
  });
}

export function quotient(a: Rational, b: Rational): TextResult<Rational> {
  if (isZeroRational(b))
    return refuse('ZERO_DENOMINATOR', 'This divides by zero. Write a denominator other than 0.');
  return sized({
    num: joined(a.num, b.den),
    den: joined(a.den, b.num),
    deadTimeS: a.deadTimeS - b.deadTimeS,
  });
}

/** A whole power of anything, or any power of a number. */
export function power(base: Rational, exponent: number): TextResult<Rational> {
  const number = numberOf(base);
  const size = Math.abs(exponent);
  if (number === 0 && exponent < 0)
    return refuse('ZERO_DENOMINATOR', 'A negative power of zero divides by zero. Use a base other than 0.');
  if (number !== null) return sized(constant(number ** exponent));
  if (!Number.isInteger(exponent))
    return refuse('NOT_RATIONAL', `A power must be a whole number, not ${exponent}.`);
  if (size > LARGEST_DEGREE)
    return refuse('ORDER_TOO_HIGH', `The power ${exponent} makes an order far above 20.`);
  let result: TextResult<Rational> = ok(constant(1));
  for (let i = 0; i < size && result.ok; i += 1)
    result = exponent > 0 ? product(result.value, base) : quotient(result.value, base);
  return result;
}

/** e to a + b·s: the factor e^a and the dead time −b. */
export function exponentialOf(exponent: Rational): TextResult<Rational> {
  const num = expanded(exponent.num);
  const den = expanded(exponent.den);
  if (den.length > 1 || num.length > 2 || exponent.deadTimeS !== 0)
    return refuse('NOT_RATIONAL', 'Only a dead time e^(-θ s) may stand as an exponential.');
  if (num.length < 2 && num[0] !== 0)
    return refuse('SYNTAX', 'The exponent of e holds no s. Write the dead time with brackets: e^(-3 s).');
  const [slope, offset] = num.length === 2 ? num : [0, 0];
  return sized({ num: [[Math.exp(offset / den[0])]], den: [], deadTimeS: -slope / den[0] });
}
