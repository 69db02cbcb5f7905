import type { Plant, IdealController } from '../types';
import { openLoop, plantTransfer, type TransferFunction } from '../loop';
import { isZero } from '../polynomial';
import type { ComplexNumber } from '../roots';
import { loopFactors, plantFactors, type Factors } from './loop-factors';

/** Cells of the frequency mesh are at most this fraction of the distance to the nearest pole or zero wide. */
export const CELL_WIDTH = 0.25;
/** Half a cell, seen from its far end, as a fraction of that end's distance to the nearest pole or zero. */
const HALF_CELL = CELL_WIDTH / (2 * (1 - CELL_WIDTH));
/** Largest growth of 1/distance³ and 1/distance⁴ over half a cell, times half a cell. */
const LN_DRIFT = (2 * HALF_CELL) / (1 - HALF_CELL) ** 3;
const PHASE_DRIFT = (6 * HALF_CELL) / (1 - HALF_CELL) ** 4;
/** Poles and zeros nearer than this, relative to their size, do not shape the curve between them. */
const CANCELLED = 1e-12;
/** Square of the distance, relative, that stands for 0 where a frequency hits a root on the imaginary axis. */
const ON_ROOT = 1e-24;

/**
 * L(s) = K · s^(-originOrder) · num(s)/den(s) · e^(-deadTime·s) in a time unit of its own, with monic num and den that
 * do not vanish at the origin. Everything here is in scaled time; w·unitRadS is the frequency in rad/s.
 */
export class ScaledLoop {
  /** Geometric mean of the loop's corner frequencies, rad/s. */
  readonly unitRadS: number;
  readonly deadTime: number;
  /** Poles less zeros at the origin. */
  readonly originOrder: number;
  readonly relativeDegree: number;
  /** K, and the gain K·num(0)/den(0) of the low-frequency asymptote: sign and natural logarithm of the size. */
  readonly gainSign: number;
  readonly lnGain: number;
  readonly lowSign: number;
  readonly lnLowGain: number;
  /** Zeros (weight 1) and poles (weight -1) away from the origin, without pairs that cancel. */
  readonly rootRe: Float64Array;
  readonly rootIm: Float64Array;
  readonly rootWeight: Float64Array;

  /** Results of evaluate(w): natural logarithm of |L|, phase of L without its dead time (mod 2π), and slopes in w. */
  lnMagnitude = 0;
  phase = 0;
  lnSlope = 0;
  phaseSlope = 0;
  /** Results of bend(w): distance to the nearest root; bounds of the second derivatives within half a cell of w. */
  distance = 0;
  lnBend = 0;
  phaseBend = 0;

  private readonly num: Float64Array;
  private readonly den: Float64Array;
  private valueRe = 0;
  private valueIm = 0;
  private ratioRe = 0;
  private ratioIm = 0;

  /** @param factors all zeros and poles of num/den */
  constructor(
    { num, den, deadTimeS }: TransferFunction,
    readonly factors: Factors,
  ) {
    const kept = withoutCancellations(factors);
    const poleOrder = trailingZeros(den);
    const zeroOrder = trailingZeros(num);
    this.originOrder = poleOrder - zeroOrder;
    this.relativeDegree = den.length - num.length;
    const gain = num[0] / den[0];
    this.unitRadS = timeUnit(kept, deadTimeS, this.relativeDegree, gain);
    this.deadTime = deadTimeS * this.unitRadS;
    this.gainSign = Math.sign(gain);
    this.lnGain = Math.log(Math.abs(gain)) - this.relativeDegree * Math.log(this.unitRadS);
    this.num = scaledMonic(num, zeroOrder, this.unitRadS);
    this.den = scaledMonic(den, poleOrder, this.unitRadS);
    const low = this.num[this.num.length - 1] / this.den[this.den.length - 1];
    this.lowSign = this.gainSign * Math.sign(low);
    this.lnLowGain = this.lnGain + Math.log(Math.abs(low));
    this.rootRe = new Float64Array(kept.length);
    this.rootIm = new Float64Array(kept.length);
    this.rootWeight = new Float64Array(kept.length);
    kept.forEach(({ root, weight }, i) => {
      this.rootRe[i] = root.re / this.unitRadS;
      this.rootIm[i] = root.im / this.unitRadS;
      this.rootWeight[i] = weight;
    });
  }

  /** Computes lnMagnitude, phase, lnSlope and phaseSlope at w ≥ 0; at 0 those of L·s^originOrder. */
  evaluate(w: number): void {
    const high = w > 1;
    this.horner(this.num, w, high);
    const numRe = this.valueRe;
    const numIm = this.valueIm;
    const slopeRe = this.ratioRe;
    const slopeIm = this.ratioIm;
    this.horner(this.den, w, high);
    const denRe = this.valueRe;
    const denIm = this.valueIm;
    const size = (numRe * numRe + numIm * numIm) / (denRe * denRe + denIm * denIm);
    const degrees = high ? this.num.length - this.den.length : 0;
    const power = w > 0 ? degrees - this.originOrder : 0;
    this.lnMagnitude = this.lnGain + 0.5 * Math.log(size) + (power === 0 ? 0 : power * Math.log(w));
    this.phase =
      Math.atan2(numIm * denRe - numRe * denIm, numRe * denRe + numIm * denIm) +
      (this.gainSign < 0 ? -Math.PI : 0) +
      (degrees - this.originOrder) * (Math.PI / 2);
    // d ln L/dw = j·d ln L/ds; a power of s adds power/w to the real part only.
    this.lnSlope = -(slopeIm - this.ratioIm) + (power === 0 ? 0 : power / w);
    this.phaseSlope = slopeRe - this.ratioRe;
  }

  /**
   * Computes distance, lnBend and phaseBend at w. Each root at distance d bends ln|L| by (re² - dw²)/d⁴ and the phase
   * by 2·re·dw/d⁴, and these change by at most 2/d³ and 6·|re|/d⁴ per unit of w.
   */
  bend(w: number): void {
    let nearest2 = Infinity;
    let lnBend = 0;
    let lnDrift = 0;
    let phaseBend = 0;
    let phaseDrift = 0;
    for (let i = 0; i < this.rootRe.length; i += 1) {
      const re = this.rootRe[i];
      const dw = w - this.rootIm[i];
      const weight = this.rootWeight[i];
      const d2 = Math.max(re * re + dw * dw, ON_ROOT * w * w);
      const inverse = 1 / d2;
      if (d2 < nearest2) nearest2 = d2;
      lnBend += weight * (re - dw) * (re + dw) * inverse * inverse;
      lnDrift += inverse;
      phaseBend += weight * re * dw * inverse * inverse;
      phaseDrift += Math.abs(re) * inverse * Math.sqrt(inverse);
    }
    this.distance = Math.sqrt(nearest2);
    this.lnBend = Math.abs(lnBend) + LN_DRIFT * lnDrift;
    this.phaseBend = 2 * Math.abs(phaseBend) + PHASE_DRIFT * phaseDrift;
  }

  /**
   * Value and logarithmic derivative of a polynomial at s = jw. Above w = 1 of p(s)/s^degree, a polynomial in 1/s, so
   * that no power overflows; the missing degree/s is added by the caller.
   */
  private horner(p: Float64Array, w: number, high: boolean): void {
    const x = high ? -1 / w : w;
    const last = p.length - 1;
    let vRe = 0;
    let vIm = 0;
    let dRe = 0;
    let dIm = 0;
    for (let k = 0; k <= last; k += 1) {
      const nextD = vRe - dIm * x;
      dIm = vIm + dRe * x;
      dRe = nextD;
      const nextV = (high ? p[last - k] : p[k]) - vIm * x;
      vIm = vRe * x;
      vRe = nextV;
    }
    const v2 = vRe * vRe + vIm * vIm;
    const re = v2 === 0 ? 0 : (dRe * vRe + dIm * vIm) / v2;
    const im = v2 === 0 ? 0 : (dIm * vRe - dRe * vIm) / v2;
    // With y = 1/s = jx: d/ds = -y²·d/dy = x²·d/dy.
    this.ratioRe = high ? re * x * x : re;
    this.ratioIm = high ? im * x * x : im;
    this.valueRe = vRe;
    this.valueIm = vIm;
  }
}

/**
 * The loop, or the plant alone when there is no controller, ready for its frequency response; null when L is zero.
 * @throws RangeError for a plant or controller outside its range
 */
export function scaledLoop(plant: Plant, controller: IdealController | null): ScaledLoop | null {
  const transfer = controller === null ? plantTransfer(plant) : openLoop(plant, controller);
  if (isZero(transfer.num)) return null;
  return new ScaledLoop(transfer, controller === null ? plantFactors(plant) : loopFactors(plant, controller));
}

interface WeightedRoot {
  readonly root: ComplexNumber;
  readonly weight: 1 | -1;
}

function withoutCancellations({ zeros, poles }: Factors): WeightedRoot[] {
  const kept: WeightedRoot[] = [];
  for (const root of poles) if (root.re !== 0 || root.im !== 0) kept.push({ root, weight: -1 });
  for (const zero of zeros) {
    if (zero.re === 0 && zero.im === 0) continue;
    const reach = CANCELLED * (Math.abs(zero.re) + Math.abs(zero.im));
    const twin = kept.findIndex(
      ({ root, weight }) => weight < 0 && Math.abs(root.re - zero.re) + Math.abs(root.im - zero.im) <= reach,
    );
    if (twin >= 0) kept.splice(twin, 1);
    else kept.push({ root: zero, weight: 1 });
  }
  return kept;
}

function timeUnit(
  kept: readonly WeightedRoot[],
  deadTimeS: number,
  relativeDegree: number,
  gain: number,
): number {
  if (kept.length > 0) {
    const sum = kept.reduce(
      (total, { root }) => total + 0.5 * Math.log(root.re * root.re + root.im * root.im),
      0,
    );
    return Math.exp(sum / kept.length);
  }
  if (deadTimeS > 0) return 1 / deadTimeS;
  return relativeDegree > 0 ? Math.pow(Math.abs(gain), 1 / relativeDegree) : 1;
}

function trailingZeros(p: readonly number[]): number {
  return p.length - 1 - p.findLastIndex((c) => c !== 0);
}

function scaledMonic(p: readonly number[], originOrder: number, unit: number): Float64Array {
  const monic = new Float64Array(p.length - originOrder);
  let power = p[0];
  for (let i = 0; i < monic.length; i += 1) {
    monic[i] = p[i] / power;
    power *= unit;
  }
  return monic;
}
