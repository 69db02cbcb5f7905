/**
 * One cubic on ξ from 0 to 1, kept as coefficients a + bξ + cξ² + dξ³ and used again for every piece: the scans over
 * a response go through thousands of them and allocate nothing.
 */
export class Cubic {
  a = 0;
  b = 0;
  c = 0;
  d = 0;

  /** From values and time derivatives at both ends of a piece of length h. */
  fromEnds(h: number, y0: number, dy0: number, y1: number, dy1: number): void {
    const s0 = h * dy0;
    const s1 = h * dy1;
    this.a = y0;
    this.b = s0;
    this.c = 3 * (y1 - y0) - 2 * s0 - s1;
    this.d = 2 * (y0 - y1) + s0 + s1;
  }

  at(x: number): number {
    return this.a + x * (this.b + x * (this.c + x * this.d));
  }

  /** Stationary points inside (0, 1), in ascending order, into the given array; returns how many there are. */
  stationary(into: Float64Array): number {
    const p = 3 * this.d;
    const q = 2 * this.c;
    const r = this.b;
    let count = 0;
    if (Math.abs(p) <= 1e-14 * (Math.abs(q) + Math.abs(r))) {
      const x = q === 0 ? -1 : -r / q;
      if (x > 0 && x < 1) into[count++] = x;
      return count;
    }
    const discriminant = q * q - 4 * p * r;
    if (discriminant <= 0) return 0;
    const w = -0.5 * (q + (q < 0 ? -1 : 1) * Math.sqrt(discriminant));
    const x1 = w / p;
    const x2 = w === 0 ? -1 : r / w;
    const low = Math.min(x1, x2);
    const high = Math.max(x1, x2);
    if (low > 0 && low < 1) into[count++] = low;
    if (high > 0 && high < 1 && high !== low) into[count++] = high;
    return count;
  }

  /** The crossing of a level between two places on either side of it, by bisection with secant steps. */
  crossing(level: number, from: number, to: number): number {
    let low = from;
    let high = to;
    let fLow = this.at(low) - level;
    for (let i = 0; i < 60 && high - low > 1e-14; i += 1) {
      const fHigh = this.at(high) - level;
      const secant = fHigh === fLow ? 0.5 : -fLow / (fHigh - fLow);
      const share = i % 3 === 2 ? 0.5 : Math.min(0.999, Math.max(0.001, secant));
      const middle = low + share * (high - low);
      const f = this.at(middle) - level;
      if (f === 0) return middle;
      if (f > 0 === fLow > 0) {
        low = middle;
        fLow = f;
      } else high = middle;
    }
    return 0.5 * (low + high);
  }
}
