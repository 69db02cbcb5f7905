import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  cascadeToIdeal,
  DERIVATIVE_UNITS,
  FILTER_UNITS,
  fromDevice,
  GAIN_UNITS,
  idealToCascade,
  idealToParallel,
  idealToSeriesWithLag,
  INTEGRAL_UNITS,
  numbersOf,
  parallelToIdeal,
  seriesToIdeal,
  toDevice,
  type ControllerForm,
  type Convention,
  type DerivativeUnit,
  type FilterUnit,
  type GainUnit,
  type IntegralUnit,
} from '../../lib/control/forms';
import { parameterUnits } from '../../lib/control/forms/look-up';
import { controllerOf, exactValues } from '../../lib/control/forms/terms';
import type { IdealController } from '../../lib/control/types';

const SETS = 10_000;
const TOLERANCE = 1e-9;

/** Positive numbers spread evenly over decades. */
const decades = (from: number, to: number) =>
  fc.double({ min: from, max: to, noNaN: true }).map((exponent) => 10 ** exponent);

/** Any controller; the derivative time stays below a quarter of the integral time, so that every form exists. */
const controllers: fc.Arbitrary<IdealController> = fc
  .record({
    size: decades(-6, 6),
    sign: fc.constantFrom(1, -1),
    ti: fc.oneof({ weight: 9, arbitrary: decades(-4, 6) }, { weight: 1, arbitrary: fc.constant(Infinity) }),
    share: fc.oneof(
      { weight: 9, arbitrary: decades(-5, Math.log10(0.25)) },
      { weight: 1, arbitrary: fc.constant(0) },
    ),
    n: decades(0, 3),
    b: fc.double({ min: 0, max: 1, noNaN: true }),
    c: fc.double({ min: 0, max: 1, noNaN: true }),
  })
  .map(({ size, sign, ti, share, n, b, c }) => {
    const td = Math.min(share, 0.25) * (ti === Infinity ? 10 : ti);
    return { kp: sign * size, ti, td, n, b, c };
  });

const grounds = fc.record({
  sampleTimeS: decades(-4, 2),
  inputSpan: decades(-2, 5),
  outputSpan: decades(-2, 5),
  inputCounts: fc.constantFrom(1000, 4095, 27648, 65535),
  outputCounts: fc.constantFrom(100, 4095, 27648, 65535),
});

const forms: readonly ControllerForm[] = ['ideal', 'parallel', 'series'];
const keysOf = <K extends string>(table: Readonly<Record<K, unknown>>) => Object.keys(table) as K[];

function distance(one: number, other: number): number {
  return one === other ? 0 : Math.abs(one - other) / Math.max(Math.abs(one), Math.abs(other));
}

function worstDistance(one: IdealController, other: IdealController): number {
  return Math.max(distance(one.kp, other.kp), distance(one.ti, other.ti), distance(one.td, other.td));
}

/** There and back; the largest relative difference. */
function roundTrip(controller: IdealController, convention: Convention): number {
  const device = toDevice(controller, convention);
  if (!device.ok) throw new Error(`${JSON.stringify(convention)}: ${device.message}`);
  const back = fromDevice(numbersOf(device.value.rows), convention, {
    b: controller.b,
    c: controller.c,
    n: controller.n,
  });
  if (!back.ok) throw new Error(`${JSON.stringify(convention)}: ${back.message}`);
  return worstDistance(controller, back.value);
}

/** The same without texts and warnings, for the sweep over every combination. */
function exactRoundTrip(controller: IdealController, convention: Convention): number {
  const units = parameterUnits(convention);
  const values = units.ok ? exactValues(controller, convention, units.value) : units;
  const back = units.ok && values.ok ? controllerOf(values.value, convention, units.value, {}) : null;
  if (back === null || !back.ok) throw new Error(`${JSON.stringify(convention)} has no way back`);
  return worstDistance(controller, back.value);
}

describe('conversion there and back', () => {
  it('holds to 1e-9 for every form with every gain, integral and derivative convention', () => {
    const gains: GainUnit[] = ['gain', 'proportional-band'];
    const integrals: IntegralUnit[] = ['seconds', 'minutes', 'repeats-per-minute', 'gain', 'per-sample'];
    const derivatives: DerivativeUnit[] = ['seconds', 'minutes', 'gain', 'per-sample'];
    const combinations = forms.flatMap((form) =>
      gains.flatMap((gain) =>
        integrals.flatMap((integral) =>
          derivatives.map((derivative) => ({ form, gain, integral, derivative })),
        ),
      ),
    );
    expect(combinations).toHaveLength(120);
    let worst = 0;
    fc.assert(
      fc.property(controllers, grounds, (controller, ground) => {
        for (const combination of combinations) {
          worst = Math.max(worst, exactRoundTrip(controller, { ...combination, ...ground }));
        }
        return worst <= TOLERANCE;
      }),
      { numRuns: SETS },
    );
    expect(worst).toBeLessThanOrEqual(TOLERANCE);
  });

  it('holds for the rarer units, scales, off codes, actions and filters too', () => {
    const conventions: fc.Arbitrary<Convention> = fc.record(
      {
        form: fc.constantFrom(...forms),
        gain: fc.constantFrom(...keysOf(GAIN_UNITS)),
        integral: fc.constantFrom(...keysOf(INTEGRAL_UNITS)),
        derivative: fc.constantFrom(...keysOf(DERIVATIVE_UNITS)),
        scale: fc.constantFrom(1, 10, 4096, 65536),
        offCodes: fc.constantFrom({}, { i: 0 }, { i: 0, d: 0 }, { i: -123.456789, d: -123.456789 }),
      },
      { requiredKeys: ['form', 'gain', 'integral', 'derivative'] },
    );
    fc.assert(
      fc.property(
        controllers,
        grounds,
        conventions,
        fc.boolean(),
        (controller, ground, convention, hasAction) => {
          const action = controller.kp > 0 ? 'reverse' : 'direct';
          const whole: Convention = { ...convention, ...ground, ...(hasAction ? { action } : {}) };
          return roundTrip(controller, whole) <= TOLERANCE;
        },
      ),
      { numRuns: SETS },
    );
  });

  it('keeps the derivative filter where the device has a parameter for it', () => {
    const filters: FilterUnit[] = keysOf(FILTER_UNITS);
    fc.assert(
      fc.property(
        controllers.filter(({ td }) => td > 0),
        fc.constantFrom(...forms),
        fc.constantFrom(...filters),
        (given, form, filter) => {
          const controller = { ...given, td: given.td / 2 };
          // The smoothing factor loses digits when the sample time is far below the filter time: choose them alike.
          const sampleTimeS = controller.td / controller.n;
          const convention: Convention = {
            form,
            gain: 'gain',
            integral: 'seconds',
            derivative: 'seconds',
            filter,
            sampleTimeS,
          };
          const device = toDevice(controller, convention);
          // Near the limit of the series form the lag may rule it out.
          if (!device.ok) return device.code === 'NO_SERIES_FORM';
          const back = fromDevice(numbersOf(device.value.rows), convention);
          return (
            back.ok &&
            distance(back.value.n, controller.n) < 1e-7 &&
            distance(back.value.kp, controller.kp) <= TOLERANCE
          );
        },
      ),
      { numRuns: SETS },
    );
  });

  it('goes through the parallel form unchanged', () => {
    fc.assert(
      fc.property(controllers, (controller) => {
        const back = parallelToIdeal(idealToParallel(controller), controller);
        return (
          back.ok &&
          worstDistance(back.value, controller) < 1e-13 &&
          distance(back.value.n, controller.n) < 1e-13
        );
      }),
    );
  });

  it('goes through the cascade unchanged', () => {
    const cascades = fc.record({
      form: fc.constant('cascade' as const),
      velocityGain: decades(-3, 3),
      velocityIntegralTimeS: decades(-4, 1),
      positionGain: decades(-1, 3),
    });
    fc.assert(
      fc.property(cascades, (cascade) => {
        const ideal = cascadeToIdeal(cascade);
        const back = idealToCascade(ideal);
        // Equal rates sit on the edge of existence, where rounding decides.
        if (!back.ok) return Math.abs(ideal.ti / ideal.td / 4 - 1) < 1e-12;
        return worstDistance(cascadeToIdeal(back.value), ideal) <= TOLERANCE;
      }),
    );
  });
});

describe('series form with lag', () => {
  /** kp·(1 + 1/(ti s) + td s/(1 + td s/n)) at s = jw, real and imaginary part. */
  function idealResponse({ kp, ti, td, n }: IdealController, w: number): [number, number] {
    const lag = (td / n) * w;
    const weight = (td * w) / (1 + lag * lag);
    return [kp * (1 + weight * lag), kp * (weight - 1 / (ti * w))];
  }

  /** kc·(1 + 1/(tI s))·(1 + tD s)/(1 + lag s) at s = jw. */
  function seriesResponse(kc: number, tI: number, tD: number, lagS: number, w: number): [number, number] {
    const a: [number, number] = [1, -1 / (tI * w)];
    const square = 1 + (lagS * w) ** 2;
    const b: [number, number] = [(1 + tD * lagS * w * w) / square, ((tD - lagS) * w) / square];
    return [kc * (a[0] * b[0] - a[1] * b[1]), kc * (a[0] * b[1] + a[1] * b[0])];
  }

  it('has the frequency response of the ideal form', () => {
    fc.assert(
      fc.property(
        controllers.filter(({ td }) => td > 0),
        decades(-2, 2),
        (controller, relative) => {
          const series = idealToSeriesWithLag(controller);
          if (!series.ok)
            return series.code === 'NO_SERIES_FORM' && idealToSeriesWithLag(series.closest ?? controller).ok;
          const { kc, tI, tD, lagS } = series.value;
          const w = relative / controller.td;
          const [re, im] = idealResponse(controller, w);
          const [seriesRe, seriesIm] = seriesResponse(kc, tI, tD, lagS, w);
          const back = seriesToIdeal(series.value);
          return Math.hypot(re - seriesRe, im - seriesIm) <= 1e-9 * Math.hypot(re, im) && back.ok;
        },
      ),
      { numRuns: 2000 },
    );
  });
});
