/** Two roots closer than this, relative to their mean, are one repeated root split by rounding. */
const REPEATED_WITHIN = 1e-9;

/** Both roots of x² + p x + q (given as [1, p, q], leading coefficient 1) when they are real, else null. */
export function realRootsOfQuadratic([, p, q]: readonly number[]): number[] | null {
  const mean = -p / 2;
  // Rounding of the coefficients moves the half distance of the roots by √ε only, so it is judged as a square.
  const halfDistanceSquared = mean * mean - q;
  if (
    Math.abs(halfDistanceSquared) <=
    REPEATED_WITHIN ** 2 * mean * mean + 8 * Number.EPSILON * Math.abs(q)
  ) {
    return [mean, mean];
  }
  if (halfDistanceSquared < 0) return null;
  const far = mean + Math.sign(mean || 1) * Math.sqrt(halfDistanceSquared);
  return [far, q / far];
}

/** The three roots of x³ + a x² + b x + c (given as [1, a, b, c]) when all are real, else null. */
export function realRootsOfCubic([, a, b, c]: readonly number[]): number[] | null {
  const shift = -a / 3;
  // Depressed cubic z³ + p z + q with x = z + shift; size and rounding of p and q are judged against the shift.
  const p = b - (a * a) / 3;
  const q = (2 * a ** 3) / 27 - (a * b) / 3 + c;
  const size = Math.max(Math.abs(shift), Math.sqrt(Math.abs(b) / 3), Math.cbrt(Math.abs(c)));
  const rounding = 32 * Number.EPSILON;
  if (Math.abs(p) <= rounding * size ** 2 && Math.abs(q) <= rounding * size ** 3)
    return [shift, shift, shift];
  const discriminant = -4 * p ** 3 - 27 * q ** 2;
  const discriminantRounding = rounding * (12 * p * p * size ** 2 + 54 * Math.abs(q) * size ** 3);
  if (Math.abs(discriminant) <= discriminantRounding) {
    const single = (3 * q) / p;
    return [single + shift, -single / 2 + shift, -single / 2 + shift];
  }
  if (discriminant < 0) return null;
  const radius = 2 * Math.sqrt(-p / 3);
  const angle = Math.acos(Math.max(-1, Math.min(1, (3 * q) / (p * radius)))) / 3;
  return [0, 1, 2]
    .map((i) => radius * Math.cos(angle - (2 * Math.PI * i) / 3) + shift)
    .map((x) => polished(x, a, b, c));
}

/** Newton steps on the original cubic remove the cancellation of small roots beside large ones. */
function polished(start: number, a: number, b: number, c: number): number {
  let x = start;
  for (let i = 0; i < 4; i += 1) {
    const slope = (3 * x + 2 * a) * x + b;
    const step = (((x + a) * x + b) * x + c) / slope;
    if (!Number.isFinite(step)) break;
    x -= step;
    if (Math.abs(step) <= Number.EPSILON * Math.abs(x)) break;
  }
  return x;
}
