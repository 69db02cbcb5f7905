/** A jump in the derivative of this order is no hindrance to a cubic whose error is watched. */
const SMOOTH = 5;
/** Jumps that have shrunk to this share of the first are over. */
const GONE = 1e-9;

interface Arrival {
  readonly timeS: number;
  /** Order of the derivative of the plant's input that jumps: 0 a jump, 1 a kink … */
  readonly order: number;
  readonly share: number;
}

/**
 * The times at which jumps and kinks of the controller output reach the plant, one dead time after they arose. Each
 * makes another one that arrives a dead time later, smoother by the relative degree of plant and filter; where that is
 * zero the jumps shrink by the loop's gain at infinite frequency instead.
 */
export class Breaks {
  private arrivals: Arrival[] = [];

  constructor(
    private readonly deadTimeS: number,
    private readonly smoothing: number,
    private readonly direct: number,
  ) {}

  /** The controller output has a jump in its derivative of this order now. */
  arise(timeS: number, order: number, share = 1): void {
    if (this.deadTimeS === 0 || order >= SMOOTH || share < GONE) return;
    const arrival = { timeS: timeS + this.deadTimeS, order, share };
    const same = this.arrivals.findIndex((a) => Math.abs(a.timeS - arrival.timeS) <= 1e-9 * this.deadTimeS);
    if (same >= 0) {
      if (this.arrivals[same].order > order)
        this.arrivals[same] = { ...arrival, timeS: this.arrivals[same].timeS };
      return;
    }
    const place = this.arrivals.findIndex((a) => a.timeS > arrival.timeS);
    this.arrivals.splice(place < 0 ? this.arrivals.length : place, 0, arrival);
  }

  /** The next arrival; Infinity when none is on its way. */
  next(): number {
    return this.arrivals.length > 0 ? this.arrivals[0].timeS : Infinity;
  }

  /** The next arrival is now. */
  pass(): void {
    const arrived = this.arrivals.shift();
    if (!arrived) return;
    const { timeS, order, share } = arrived;
    this.arise(timeS, order + this.smoothing, this.smoothing > 0 ? share : share * this.direct);
  }
}
