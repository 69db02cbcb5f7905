import type { Trajectory } from '../metrics';

/** Reads the controller output of a trajectory at past times that only move forward, one side of a jump at a time. */
export class DelayedOutput {
  /** Piece in which the last start lay. */
  piece = 0;
  value = 0;
  slope = 0;

  constructor(private readonly trajectory: Trajectory) {}

  /** Just after a time. */
  after(timeS: number): void {
    const { t, count } = this.trajectory;
    let { piece } = this;
    while (piece < count - 1 && t[piece + 1] <= timeS) piece += 1;
    this.piece = piece;
    this.read(piece, timeS);
  }

  /** Just before a time later than that of the last `after`; returns its piece. */
  before(timeS: number): number {
    const { t, count } = this.trajectory;
    let { piece } = this;
    while (piece < count - 1 && t[piece + 1] < timeS) piece += 1;
    this.read(piece, timeS);
    return piece;
  }

  private read(piece: number, timeS: number): void {
    const { t, u0, u1, du0, du1 } = this.trajectory;
    if (timeS === t[piece]) {
      this.value = u0[piece];
      this.slope = du0[piece];
    } else if (timeS === t[piece + 1]) {
      this.value = u1[piece];
      this.slope = du1[piece];
    } else {
      const h = t[piece + 1] - t[piece];
      const x = (timeS - t[piece]) / h;
      const b = h * du0[piece];
      const c = 3 * (u1[piece] - u0[piece]) - 2 * b - h * du1[piece];
      const d = 2 * (u0[piece] - u1[piece]) + b + h * du1[piece];
      this.value = u0[piece] + x * (b + x * (c + x * d));
      this.slope = (b + x * (2 * c + 3 * x * d)) / h;
    }
  }
}
