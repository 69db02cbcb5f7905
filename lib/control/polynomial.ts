/**
 * Real polynomials as coefficient lists in descending powers: [1, 118.8, 1936] is s² + 118.8 s + 1936.
 * Inputs are never changed; the empty list and lists of zeros stand for the zero polynomial.
 */
export type Polynomial = readonly number[];

/** Drops leading zeros; the zero polynomial becomes [0]. */
export function trimmed(p: Polynomial): number[] {
  let first = 0;
  while (first < p.length - 1 && p[first] === 0) first += 1;
  return p.length === 0 ? [0] : p.slice(first);
}

export function isZero(p: Polynomial): boolean {
  return p.every((c) => c === 0);
}

export function add(p: Polynomial, q: Polynomial): number[] {
  const length = Math.max(p.length, q.length);
  const sum = new Array<number>(length).fill(0);
  p.forEach((c, i) => (sum[length - p.length + i] += c));
  q.forEach((c, i) => (sum[length - q.length + i] += c));
  return sum;
}

export function scale(p: Polynomial, factor: number): number[] {
  return p.map((c) => c * factor);
}

export function multiply(p: Polynomial, q: Polynomial): number[] {
  if (p.length === 0 || q.length === 0) return [0];
  const product = new Array<number>(p.length + q.length - 1).fill(0);
  for (let i = 0; i < p.length; i += 1) for (let j = 0; j < q.length; j += 1) product[i + j] += p[i] * q[j];
  return product;
}

/** Value at a real argument, by Horner's rule. */
export function evaluateReal(p: Polynomial, x: number): number {
  let value = 0;
  for (const c of p) value = value * x + c;
  return value;
}

/** Value at the complex argument re + i·im, by Horner's rule; returns [real part, imaginary part]. */
export function evaluateComplex(p: Polynomial, re: number, im: number): [number, number] {
  let valueRe = 0;
  let valueIm = 0;
  for (const c of p) {
    const next = valueRe * re - valueIm * im + c;
    valueIm = valueRe * im + valueIm * re;
    valueRe = next;
  }
  return [valueRe, valueIm];
}

export function derivative(p: Polynomial): number[] {
  const n = p.length - 1;
  return n < 1 ? [0] : p.slice(0, n).map((c, i) => c * (n - i));
}
