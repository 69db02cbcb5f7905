import { ideal } from './native';
import { defineRule, stepTestRow } from './row';
import type { Row } from './types';

/** One column of the table: aKp; aKp, Ti; aKp, Ti, Td, with a = kθ/τ and the times as multiples of τ or θ. */
interface Column {
  readonly p: number;
  readonly pi: readonly [gain: number, integral: number, of: 'tau' | 'theta'];
  readonly pid: readonly [gain: number, integral: number, of: 'tau' | 'theta', derivative: number];
}

const SOURCE =
  'Chien, Hrones & Reswick, On the automatic control of generalized passive systems, Transactions of the ASME 74 (1952) 175–185';
const VALIDITY = 'First-order plants with dead time, about 0.1 < θ/τ < 1.';

function chr<const Id extends string>(id: Id, name: string, aim: string, column: Column) {
  return defineRule({
    id,
    name,
    types: ['P', 'PI', 'PID'],
    aim,
    form: 'ideal',
    validity: VALIDITY,
    source: SOURCE,
    deadTimeRatio: [0.1, 1],
    setting: null,
    variants: [],
    rows: rowsOf(column),
  });
}

function rowsOf({ p, pi, pid }: Column): Row[] {
  return [
    stepTestRow('P', (k, tau, theta) => ideal((p * tau) / (k * theta))),
    stepTestRow('PI', (k, tau, theta) =>
      ideal((pi[0] * tau) / (k * theta), pi[1] * (pi[2] === 'tau' ? tau : theta)),
    ),
    stepTestRow('PID', (k, tau, theta) =>
      ideal((pid[0] * tau) / (k * theta), pid[1] * (pid[2] === 'tau' ? tau : theta), pid[3] * theta),
    ),
  ];
}

/** Chien–Hrones–Reswick, set-point without overshoot. Some open codes print 1.2 θ for the PI integral time: it is 1.2 τ. */
export const chrSetpoint0 = chr(
  'chr-setpoint-0',
  'Chien–Hrones–Reswick, set-point without overshoot',
  'Set-point: the fastest response without overshoot.',
  { p: 0.3, pi: [0.35, 1.2, 'tau'], pid: [0.6, 1, 'tau', 0.5] },
);

/** Chien–Hrones–Reswick, set-point with 20 % overshoot. Sources print 1.35, 1.357 or 1.4 τ for the PID integral time. */
export const chrSetpoint20 = chr(
  'chr-setpoint-20',
  'Chien–Hrones–Reswick, set-point with 20 % overshoot',
  'Set-point: the fastest response with 20 % overshoot.',
  { p: 0.7, pi: [0.6, 1, 'tau'], pid: [0.95, 1.4, 'tau', 0.47] },
);

/** Chien–Hrones–Reswick, load without overshoot. */
export const chrLoad0 = chr(
  'chr-load-0',
  'Chien–Hrones–Reswick, load without overshoot',
  'Load: the fastest recovery without overshoot.',
  { p: 0.3, pi: [0.6, 4, 'theta'], pid: [0.95, 2.4, 'theta', 0.42] },
);

/** Chien–Hrones–Reswick, load with 20 % overshoot. */
export const chrLoad20 = chr(
  'chr-load-20',
  'Chien–Hrones–Reswick, load with 20 % overshoot',
  'Load: the fastest recovery with 20 % overshoot.',
  { p: 0.7, pi: [0.7, 2.3, 'theta'], pid: [1.2, 2, 'theta', 0.42] },
);
