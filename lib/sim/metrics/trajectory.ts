/**
 * A response as pieces in time: on each one y and u are cubic polynomials given by their values and time derivatives
 * at both ends. Where a signal jumps, one piece ends with the value before and the next begins with the value after.
 */
export class Trajectory {
  /** Piece i runs from t[i] to t[i + 1], s. */
  t: Float64Array;
  y0: Float64Array;
  dy0: Float64Array;
  y1: Float64Array;
  dy1: Float64Array;
  u0: Float64Array;
  du0: Float64Array;
  u1: Float64Array;
  du1: Float64Array;
  count = 0;

  /** @param capacity pieces to make room for at first; it grows by itself */
  constructor(capacity = 1024) {
    this.t = new Float64Array(capacity + 1);
    [this.y0, this.dy0, this.y1, this.dy1] = arrays(capacity);
    [this.u0, this.du0, this.u1, this.du1] = arrays(capacity);
  }

  /** Index of a new piece from the end of the last one to time `to`; the caller fills in the values at its ends. */
  add(to: number): number {
    if (this.count === this.y0.length) this.grow();
    const index = this.count;
    this.t[index + 1] = to;
    this.count += 1;
    return index;
  }

  private grow(): void {
    const capacity = 2 * this.y0.length;
    const larger = (values: Float64Array, length: number) => {
      const copy = new Float64Array(length);
      copy.set(values);
      return copy;
    };
    this.t = larger(this.t, capacity + 1);
    this.y0 = larger(this.y0, capacity);
    this.dy0 = larger(this.dy0, capacity);
    this.y1 = larger(this.y1, capacity);
    this.dy1 = larger(this.dy1, capacity);
    this.u0 = larger(this.u0, capacity);
    this.du0 = larger(this.du0, capacity);
    this.u1 = larger(this.u1, capacity);
    this.du1 = larger(this.du1, capacity);
  }
}

function arrays(length: number): [Float64Array, Float64Array, Float64Array, Float64Array] {
  return [
    new Float64Array(length),
    new Float64Array(length),
    new Float64Array(length),
    new Float64Array(length),
  ];
}
