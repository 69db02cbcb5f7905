/** A jump in the derivative of this order is invisible to a method of the order that the solver reaches. */
const SMOOTH_ENOUGH = 9;

interface Break {
  readonly x: number;
  /** Order of the derivative of the plant input that jumps: 0 a jump, 1 a kink … */
  readonly order: number;
}

/**
 * The moments at which jumps and kinks of the controller output arrive at the plant, one dead time after they arose.
 * Each makes another one, smoothed by plant and filter, that arrives one dead time later.
 */
export class Breaks {
  private waiting: Break[] = [];
  private readonly margin: number;

  constructor(
    private readonly delay: number,
    private readonly smoothing: number,
    private readonly end: number,
  ) {
    this.margin = 1e-12 * end + 1e-9 * delay;
  }

  /** The controller output has a jump in its derivative of this order at x. */
  arise(x: number, order: number): void {
    const arrival = x + this.delay;
    if (this.delay === 0 || order >= SMOOTH_ENOUGH || arrival >= this.end) return;
    if (this.waiting.some((w) => Math.abs(w.x - arrival) <= this.margin && w.order <= order)) return;
    const place = this.waiting.findIndex((w) => w.x > arrival);
    this.waiting.splice(place < 0 ? this.waiting.length : place, 0, { x: arrival, order });
  }

  /** The next moment after x, or the end. */
  next(): number {
    return this.waiting.length > 0 ? this.waiting[0].x : this.end;
  }

  /** The integration has come to x. */
  pass(x: number): void {
    while (this.waiting.length > 0 && this.waiting[0].x <= x + this.margin) {
      const { x: arrived, order } = this.waiting.shift() as Break;
      this.arise(arrived, order + this.smoothing);
    }
  }
}
