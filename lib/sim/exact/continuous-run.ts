import { Breaks } from './breaks';
import { constantOf, type ContinuousLoop, type Mode } from './continuous-loop';
import type { LastPair, Span } from './integrator';
import { timeOutside } from './limit-event';
import type { Floors } from './loop-scales';
import type { StepKind } from './spaces';
import { Stepper } from './stepper';

/** Steps are made no shorter than this share of the time asked for. */
const MOST_STEPS = 2e6;
/** A limit takes hold, and lets go, this much beyond it: share of the largest v. */
const MARGIN = 1e-10;
/** Changes of regime at one and the same time. */
const MOST_CHANGES = 4;

/** One response of a loop with a continuous controller from rest, computed as far as it is asked for. */
export class ContinuousRun {
  readonly stepper: Stepper;
  private readonly breaks: Breaks;
  private mode: Mode = 'free';
  private changes = 0;

  constructor(
    private readonly loop: ContinuousLoop,
    private readonly kind: StepKind,
    floors?: Floors,
  ) {
    this.stepper = new Stepper({ ...loop.settings[kind], ...floors });
    this.breaks = new Breaks(loop.deadTimeS, loop.smoothing, loop.direct);
    this.breaks.arise(0, 0);
    this.choose();
  }

  /** Goes on until the trajectory covers the time. */
  extendTo(timeS: number): void {
    const { stepper, breaks } = this;
    const { baseS, leastLevel } = stepper.settings;
    stepper.leastLevel = Math.max(leastLevel, Math.ceil(Math.log2(timeS / MOST_STEPS / baseS)));
    while (stepper.timeS < timeS && !stepper.refusal) {
      const from = stepper.timeS;
      const changed = stepper.run(this.span(this.mode), timeS);
      if (stepper.timeS > from) this.changes = 0;
      if (changed) this.change();
      else if (stepper.timeS >= breaks.next()) {
        breaks.pass();
        this.choose();
      }
    }
  }

  private span(mode: Mode): Span {
    const { loop, kind, stepper, breaks } = this;
    const { deadTimeS, low, high, free, held } = loop;
    const isHeld = mode !== 'free' && held !== null;
    return {
      endS: breaks.next(),
      regime: isHeld ? held : free,
      constant: constantOf(kind, mode),
      held: isHeld ? (mode === 'low' ? low : high) : NaN,
      delayed: deadTimeS > 0 && stepper.timeS >= deadTimeS * (1 - 1e-9),
      input: 0,
      event: held && this.changes <= MOST_CHANGES ? (pair) => this.timeOfChange(pair, mode) : null,
    };
  }

  private timeOfChange(pair: LastPair, mode: Mode): number | null {
    const { stepper } = this;
    const { low, high } = this.loop;
    const margin = MARGIN * Math.max(stepper.peakV, stepper.settings.vFloor);
    if (mode === 'free') return timeOutside(pair, low - margin, high + margin);
    if (mode === 'high') return timeOutside(pair, high - margin, Infinity);
    return timeOutside(pair, -Infinity, low + margin);
  }

  /** At the start, and where something sharp arrives: the regime that v asks for. */
  private choose(): void {
    const { loop, stepper } = this;
    if (!loop.held) return;
    const v = stepper.startV(this.span('free'));
    const next = v > loop.high ? 'high' : v < loop.low ? 'low' : 'free';
    if (next !== this.mode) this.mode = next;
  }

  /** v has come to a limit, or has come back from it. */
  private change(): void {
    const { loop, stepper, breaks } = this;
    this.changes += 1;
    if (this.mode === 'free') {
      const v = stepper.startV(this.span('free'));
      this.mode = Math.abs(v - loop.high) < Math.abs(v - loop.low) ? 'high' : 'low';
    } else this.mode = 'free';
    breaks.arise(stepper.timeS, 1);
  }
}
