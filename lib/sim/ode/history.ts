import type { Solution } from './pieces';

/**
 * What reaches the plant after the dead time: controller output and load of `delay` ago, nothing before t = 0.
 * One solver run never reads across a jump: `restrict` fixes the pieces it may use, so that the value at a jump is
 * that of the side the run lies on.
 */
export class DelayedInput {
  private first = 0;
  private last = 0;
  private current = 0;
  private silent = true;

  constructor(
    private readonly solution: Solution,
    private readonly delay: number,
    private readonly load: number,
  ) {}

  /** For a run from x0 to x1; pieces still to come count when the run is longer than the dead time. */
  restrict(x0: number, x1: number): void {
    const { from, to, count } = this.solution;
    const margin = 1e-9 * Math.min(this.delay, x1 - x0);
    this.silent = x1 <= this.delay + margin;
    while (this.first < count - 1 && to[this.first] <= x0 - this.delay + margin) this.first += 1;
    this.current = this.first;
    if (x1 - x0 > this.delay + margin) {
      this.last = Infinity;
      return;
    }
    this.last = this.first;
    while (this.last < count - 1 && from[this.last + 1] < x1 - this.delay - margin) this.last += 1;
  }

  at(x: number): number {
    if (this.silent) return 0;
    const past = x - this.delay;
    const piece = this.pieceAt(past);
    return this.solution.output.value(piece, this.solution.place(piece, past)) + this.load;
  }

  rateAt(x: number): number {
    if (this.silent || this.delay === 0) return 0;
    const { from, to, output } = this.solution;
    const past = x - this.delay;
    const piece = this.pieceAt(past);
    return (output.slope(piece, this.solution.place(piece, past)) * 2) / (to[piece] - from[piece]);
  }

  private pieceAt(past: number): number {
    const { from, to, count } = this.solution;
    let piece = this.current;
    const last = Math.min(this.last, count - 1);
    while (piece < last && past > to[piece]) piece += 1;
    while (piece > this.first && past < from[piece]) piece -= 1;
    this.current = piece;
    return piece;
  }
}
