import type { IdealController } from '../types';
import type { ParameterUnits } from './look-up';
import type { ControllerRest } from './parallel';
import { idealToSeries, idealToSeriesWithLag, seriesToIdeal } from './series';
import type { Conversion, Convention, DeviceName } from './types';

/** The controller in the form of the device, before units: linear gain of the device, times in s. */
interface Terms {
  readonly k: number;
  readonly ti: number;
  readonly td: number;
  readonly tf: number;
}

/** Exact numbers of a device; i = null or d = null is a term that is off, f = null one without meaning. */
export interface ExactValues {
  readonly p: number;
  readonly i: number | null;
  readonly d: number | null;
  readonly f: number | null;
}

/** Canonical controller to the exact numbers of a device, before its scale and resolution. */
export function exactValues(
  controller: IdealController,
  convention: Convention,
  units: ParameterUnits,
): Conversion<ExactValues> {
  const { gain, integral, derivative, filter, ground } = units;
  const terms = formTerms(controller, convention);
  if (!terms.ok) return terms;
  const { ti, td, tf } = terms.value;
  const sign = convention.action === 'direct' ? -1 : 1;
  const k = sign * terms.value.k * gain.factor(ground);
  const carriesGain = (ofGain: true | undefined) => ofGain === true || convention.form === 'parallel';

  const strength = carriesGain(integral.ofGain) ? k / ti : 1 / ti;
  const lead = carriesGain(derivative.ofGain) ? k * td : td;
  const value: ExactValues = {
    p: gain.band ? gain.band(ground) / k : k,
    i:
      ti === Infinity
        ? null
        : integral.isTime
          ? integral.factor(ground) / strength
          : integral.factor(ground) * strength,
    d: td === 0 ? null : derivative.factor(ground) * lead,
    f: filter === null || td === 0 ? null : filter.value(tf, td, ground),
  };
  return { ok: true, value };
}

function formTerms(controller: IdealController, convention: Convention): Conversion<Terms> {
  const { kp, ti, td, n } = controller;
  if (convention.form !== 'series') return { ok: true, value: { k: kp, ti, td, tf: td / n } };
  const series = convention.filter ? idealToSeriesWithLag(controller) : idealToSeries(controller);
  if (!series.ok) return series;
  const { kc, tI, tD, lagS } = series.value;
  return { ok: true, value: { k: kc, ti: tI, td: tD, tf: lagS } };
}

/** The exact numbers of a device back to the canonical controller. */
export function controllerOf(
  values: ExactValues,
  convention: Convention,
  units: ParameterUnits,
  rest: ControllerRest,
): Conversion<IdealController> {
  const { gain, integral, derivative, filter, ground } = units;
  const deviceGain = gain.band ? gain.band(ground) / values.p : values.p;
  const carriesGain = (ofGain: true | undefined) => ofGain === true || convention.form === 'parallel';

  let ti = Infinity;
  if (values.i !== null) {
    const strength = integral.isTime
      ? integral.factor(ground) / values.i
      : values.i / integral.factor(ground);
    ti = carriesGain(integral.ofGain) ? deviceGain / strength : 1 / strength;
  }
  let td = 0;
  if (values.d !== null) {
    const lead = values.d / derivative.factor(ground);
    td = carriesGain(derivative.ofGain) ? lead / deviceGain : lead;
  }
  if (!(ti > 0))
    return impossible(
      'i',
      `its integral time would be ${ti} s; it must be above 0 and of the sign of the gain`,
    );
  if (!(td >= 0))
    return impossible(
      'd',
      `its derivative time would be ${td} s; it must be 0 or more and of the sign of the gain`,
    );

  const tf = filter === null || values.f === null || td === 0 ? null : filter.back(values.f, td, ground);
  if (tf !== null && !(tf >= 0))
    return impossible('f', `its filter time would be ${tf} s; it must be 0 or more`);
  const sign = convention.action === 'direct' ? -1 : 1;
  const k = (sign * deviceGain) / gain.factor(ground);
  if (convention.form === 'series') {
    return seriesToIdeal(
      { form: 'series', kc: k, tI: ti, tD: td, lagS: tf ?? 0 },
      tf === 0 ? { ...rest, n: Infinity } : rest,
    );
  }
  return {
    ok: true,
    value: { n: 10, b: 1, c: 0, ...rest, kp: k, ti, td, ...(tf === null ? {} : { n: td / tf }) },
  };
}

export function impossible(name: DeviceName, why: string): Conversion<never> {
  return {
    ok: false,
    code: 'IMPOSSIBLE_VALUE',
    message: `The value of ${name.toUpperCase()} makes no controller: ${why}.`,
  };
}
