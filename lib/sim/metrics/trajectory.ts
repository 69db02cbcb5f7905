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
    [this.t, this.y0, this.dy0, this.y1, this.dy1, this.u0, this.du0, this.u1, this.du1] = columns(capacity);
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
    const { t, y0, dy0, y1, dy1, u0, du0, u1, du1 } = this;
    const larger = columns(2 * y0.length);
    [t, y0, dy0, y1, dy1, u0, du0, u1, du1].forEach((values, i) => larger[i].set(values));
    [this.t, this.y0, this.dy0, this.y1, this.dy1, this.u0, this.du0, this.u1, this.du1] = larger;
  }
}

/** Nine arrays in one piece of memory, the first longer by one. */
function columns(capacity: number): Float64Array[] {
  const memory = new ArrayBuffer(8 * (9 * capacity + 1));
  const rest = Array.from(
    { length: 8 },
    (_, i) => new Float64Array(memory, 8 * ((i + 1) * capacity + 1), capacity),
  );
  return [new Float64Array(memory, 0, capacity + 1), ...rest];
}
