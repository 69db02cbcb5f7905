import { ok, refuse } from '../../result';
import { add, multiply, scale, trimmed } from '../polynomial';
import type { TextResult } from './types';

/** num/den · e^(-deadTimeS·s) while an expression is being worked out. */
export interface Rational {
  readonly num: readonly number[];
  readonly den: readonly number[];
  readonly deadTimeS: number;
}

/** Degrees may rise for a while before they are judged, but not without end. */
const LARGEST_DEGREE = 60;

export function constant(value: number): Rational {
  return { num: [value], den: [1], deadTimeS: 0 };
}

export const S: Rational = { num: [1, 0], den: [1], deadTimeS: 0 };

export function isConstant({ num, den, deadTimeS }: Rational): boolean {
  return trimmed(num).length === 1 && trimmed(den).length === 1 && deadTimeS === 0;
}

export function isZeroRational({ num }: Rational): boolean {
  return num.every((c) => c === 0);
}

function sized(value: Rational): TextResult<Rational> {
  const num = trimmed(value.num);
  const den = trimmed(value.den);
  if (Math.max(num.length, den.length) - 1 > LARGEST_DEGREE)
    return refuse('ORDER_TOO_HIGH', 'The powers of s multiply to an order far above 20.');
  if (![...num, ...den].every(Number.isFinite))
    return refuse('NOT_FINITE', 'A coefficient grows beyond what can be computed with.');
  return ok({ num, den, deadTimeS: value.deadTimeS });
}

function sameList(a: readonly number[], b: readonly number[]): boolean {
  return a.length === b.length && a.every((value, i) => value === b[i]);
}

export function sum(a: Rational, b: Rational): TextResult<Rational> {
  if (isZeroRational(a)) return ok(b);
  if (isZeroRational(b)) return ok(a);
  if (a.deadTimeS !== b.deadTimeS)
    return refuse(
      'NOT_RATIONAL',
      'Two terms with different dead times are added; that is no single plant with one dead time.',
    );
  const { deadTimeS } = a;
  if (sameList(a.den, b.den)) return sized({ num: add(a.num, b.num), den: a.den, deadTimeS });
  return sized({
    num: add(multiply(a.num, b.den), multiply(b.num, a.den)),
    den: multiply(a.den, b.den),
    deadTimeS,
  });
}

export function negative(a: Rational): Rational {
  return { ...a, num: scale(a.num, -1) };
}

export function product(a: Rational, b: Rational): TextResult<Rational> {
  return sized({
    num: multiply(a.num, b.num),
    den: multiply(a.den, b.den),
    deadTimeS: a.deadTimeS + b.deadTimeS,
  });
}

export function quotient(a: Rational, b: Rational): TextResult<Rational> {
  if (isZeroRational(b)) return refuse('ZERO_DENOMINATOR', 'Something is divided by zero.');
  return sized({
    num: multiply(a.num, b.den),
    den: multiply(a.den, b.num),
    deadTimeS: a.deadTimeS - b.deadTimeS,
  });
}

export function power(base: Rational, exponent: number): TextResult<Rational> {
  if (!Number.isInteger(exponent) || Math.abs(exponent) > LARGEST_DEGREE)
    return isConstant(base) && Number.isFinite(exponent)
      ? sized(constant((base.num[0] / base.den[0]) ** exponent))
      : refuse(
          'NOT_RATIONAL',
          `A power of s must be a whole number up to ${LARGEST_DEGREE}, not ${exponent}.`,
        );
  let result: TextResult<Rational> = ok(constant(1));
  for (let i = 0; i < Math.abs(exponent) && result.ok; i += 1)
    result = exponent > 0 ? product(result.value, base) : quotient(result.value, base);
  return result;
}

/** e to a + b·s: the factor e^a and the dead time −b. */
export function exponentialOf(exponent: Rational): TextResult<Rational> {
  const num = trimmed(exponent.num);
  const den = trimmed(exponent.den);
  if (den.length > 1 || num.length > 2 || exponent.deadTimeS !== 0)
    return refuse('NOT_RATIONAL', 'Only a dead time e^(-θ s) may stand as an exponential.');
  if (num.length < 2 && num[0] !== 0)
    return refuse('SYNTAX', 'The exponent of e holds no s. Write the dead time with brackets: e^(-3 s).');
  const [slope, offset] = num.length === 2 ? num : [0, 0];
  return sized({ num: [Math.exp(offset / den[0])], den: [1], deadTimeS: -slope / den[0] });
}
