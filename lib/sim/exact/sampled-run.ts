import { filterDenominator } from '../../control/loop';
import type { Actuator, IdealController, Plant } from '../../control/types';
import type { Span } from './integrator';
import { fastestRate, floorsFor, levelsFor, trackingTime, type Floors } from './loop-scales';
import { balanced, loopModel } from './loop-model';
import { Regime } from './regime';
import { SampledLaw } from './sampled-law';
import { plantSpace, type StepKind } from './spaces';
import { Stepper } from './stepper';

export interface SampledOptions {
  readonly kind: StepKind;
  readonly sampleTimeS: number;
  readonly actuator: Actuator;
  readonly floors?: Floors;
}

/** Times closer than this share of the sample time are one. */
const SAME = 1e-9;

/**
 * One response of a loop whose controller runs once per sample time with zero-order hold. Plant and measurement filter
 * are stepped exactly from one change of the plant's input or sample to the next; the dead time need not be a multiple
 * of the sample time. A sample is taken just before the output changes.
 */
export class SampledRun {
  readonly stepper: Stepper;
  private readonly regime: Regime;
  private readonly law: SampledLaw;
  private readonly outputs: number[] = [];
  private arrived = 0;
  private input = 0;
  private readonly sampleTimeS: number;
  private readonly deadTimeS: number;
  private readonly r: number;
  private readonly load: number;

  constructor(
    plant: Plant,
    controller: IdealController,
    { kind, sampleTimeS, actuator, floors = floorsFor(plant, controller, kind) }: SampledOptions,
  ) {
    const plantAlone = { ...controller, kp: 0, ti: Infinity, td: 0 };
    const unbalanced = loopModel(plant, plantAlone, sampleTimeS);
    const model = balanced(unbalanced, unbalanced.a);
    const rate = Math.max(fastestRate(plant.den), fastestRate(filterDenominator(controller.filter)));
    const levels = levelsFor(rate, sampleTimeS);
    const { yFloor } = floors;
    this.regime = new Regime(plantSpace(model), levels.baseS, 0);
    this.stepper = new Stepper({
      ...levels,
      order: model.n,
      deadTimeS: 0,
      load: 0,
      yFloor,
      vFloor: yFloor,
    });
    this.law = new SampledLaw(controller, actuator, sampleTimeS, trackingTime(controller, actuator));
    this.sampleTimeS = sampleTimeS;
    this.deadTimeS = plant.deadTimeS;
    this.r = kind === 'setpoint' ? 1 : 0;
    this.load = 1 - this.r;
    if (this.deadTimeS === 0) this.input = this.load;
  }

  /** Goes on until the trajectory covers the time. */
  extendTo(timeS: number): void {
    const { stepper, outputs, sampleTimeS } = this;
    while (stepper.timeS < timeS && !stepper.refusal) {
      if (stepper.timeS >= outputs.length * sampleTimeS - SAME * sampleTimeS) this.sample();
      this.receive();
      const endS = Math.min(outputs.length * sampleTimeS, this.nextArrival());
      stepper.run(this.span(endS, outputs[outputs.length - 1]), timeS);
    }
  }

  private span(endS: number, held: number): Span {
    const { regime, input } = this;
    return { endS, regime, constant: 0, held, delayed: false, input, event: null };
  }

  private sample(): void {
    const measured = this.stepper.startV(this.span(0, 0));
    this.outputs.push(this.law.next(this.r, measured));
  }

  /** Takes over what has reached the plant by now; the load comes with the first output. */
  private receive(): void {
    while (this.stepper.timeS >= this.nextArrival() - SAME * this.sampleTimeS) {
      this.input = this.outputs[this.arrived] + this.load;
      this.arrived += 1;
    }
  }

  private nextArrival(): number {
    return this.arrived < this.outputs.length ? this.arrived * this.sampleTimeS + this.deadTimeS : Infinity;
  }
}
