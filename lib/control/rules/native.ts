import { idealController, type IdealController } from '../types';

/** Set-point weight and low-pass filters that belong to a rule's own settings. Times in seconds. */
interface Extras {
  /** Set-point weight of the proportional term that the rule asks for. */
  readonly b?: number;
  /** Low-pass on the whole controller, 1/(filterTimeS·s + 1). */
  readonly filterTimeS?: number;
  /** Low-pass on the set-point, 1/(prefilterTimeS·s + 1); `b` carries it in the ideal form. */
  readonly prefilterTimeS?: number;
}

/**
 * Settings in the form that the rule's source uses.
 *
 * ideal: kp·(1 + 1/(ti s) + td s), ti = Infinity without integral · series: kc·(1 + 1/(tI s))·(1 + tD s) ·
 * parallel: kp + ki/s + kd·s · integral: ki/s alone.
 */
export type NativeSettings =
  | ({ readonly form: 'ideal'; readonly kp: number; readonly ti: number; readonly td: number } & Extras)
  | ({ readonly form: 'series'; readonly kc: number; readonly tI: number; readonly tD: number } & Extras)
  | { readonly form: 'parallel'; readonly kp: number; readonly ki: number; readonly kd: number }
  | { readonly form: 'integral'; readonly ki: number };

export function ideal(kp: number, ti = Infinity, td = 0, extras: Extras = {}): NativeSettings {
  return { form: 'ideal', kp, ti, td, ...extras };
}

export function series(kc: number, tI: number, tD: number, extras: Extras = {}): NativeSettings {
  return { form: 'series', kc, tI, tD, ...extras };
}

export function parallel(kp: number, ki: number, kd: number): NativeSettings {
  return { form: 'parallel', kp, ki, kd };
}

export function integral(ki: number): NativeSettings {
  return { form: 'integral', ki };
}

/**
 * The same controller in the ideal form.
 *
 * @returns the controller; for `integral` the gain is 0 and the integral off, because the ideal form multiplies
 *   the integral by kp and so cannot say "integral only": the native settings alone carry it.
 */
export function toIdeal(native: NativeSettings): IdealController {
  switch (native.form) {
    case 'ideal':
      return withExtras({ kp: native.kp, ti: native.ti, td: native.td }, native);
    case 'series': {
      const f = 1 + native.tD / native.tI;
      return withExtras({ kp: native.kc * f, ti: native.tI * f, td: native.tD / f }, native);
    }
    case 'parallel':
      return idealController({
        kp: native.kp,
        ti: native.ki === 0 ? Infinity : native.kp / native.ki,
        td: native.kd === 0 ? 0 : native.kd / native.kp,
      });
    case 'integral':
      return idealController({ kp: 0 });
  }
}

/** The same settings with every gain divided by `factor`; the times stay. */
export function detuned(native: NativeSettings, factor: number): NativeSettings {
  if (factor === 1) return native;
  switch (native.form) {
    case 'ideal':
      return { ...native, kp: native.kp / factor };
    case 'series':
      return { ...native, kc: native.kc / factor };
    case 'parallel':
      return parallel(native.kp / factor, native.ki / factor, native.kd / factor);
    case 'integral':
      return integral(native.ki / factor);
  }
}

function withExtras(settings: { kp: number; ti: number; td: number }, extras: Extras): IdealController {
  return idealController({
    ...settings,
    ...(extras.b === undefined ? {} : { b: extras.b }),
    ...(extras.filterTimeS === undefined
      ? {}
      : { filter: { timeConstantS: extras.filterTimeS, order: 1 as const } }),
  });
}
