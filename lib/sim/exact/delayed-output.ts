import type { Trajectory } from '../metrics';

/** Reads the controller output of a trajectory at past times that move forward, one side of a jump at a time. */
export class DelayedOutput {
  value = 0;
  slope = 0;
  /** Piece in which the last start lay. */
  piece = 0;
  private marked = 0;

  constructor(private readonly trajectory: Trajectory) {}

  /** Remembers the place, for `rewind`. */
  mark(): void {
    this.marked = this.piece;
  }

  rewind(): void {
    this.piece = this.marked;
  }

  /** Just after a time; a piece that ends within the margin of it is over. */
  after(timeS: number, margin: number): void {
    const { t, count } = this.trajectory;
    let { piece } = this;
    while (piece < count - 1 && t[piece + 1] <= timeS + margin) piece += 1;
    this.piece = piece;
    this.read(piece, timeS);
  }

  /** Just before a time later than that of the last `after`; returns whether both lie in one piece. */
  before(timeS: number, margin: number): boolean {
    const piece = this.at(timeS - margin);
    this.read(piece, timeS);
    return piece === this.piece;
  }

  /** Anywhere in between. */
  between(timeS: number): void {
    this.read(this.at(timeS), timeS);
  }

  private at(timeS: number): number {
    const { t, count } = this.trajectory;
    let { piece } = this;
    while (piece < count - 1 && t[piece + 1] < timeS) piece += 1;
    return piece;
  }

  private read(piece: number, timeS: number): void {
    const { t, u0, u1, du0, du1 } = this.trajectory;
    const h = t[piece + 1] - t[piece];
    const x = (timeS - t[piece]) / h;
    if (x < 1e-9) {
      this.value = u0[piece];
      this.slope = du0[piece];
    } else if (x > 1 - 1e-9) {
      this.value = u1[piece];
      this.slope = du1[piece];
    } else {
      const b = h * du0[piece];
      const c = 3 * (u1[piece] - u0[piece]) - 2 * b - h * du1[piece];
      const d = 2 * (u0[piece] - u1[piece]) + b + h * du1[piece];
      this.value = u0[piece] + x * (b + x * (c + x * d));
      this.slope = (b + x * (2 * c + 3 * x * d)) / h;
    }
  }
}
