import { ideal } from './native';
import { defineRule, stepTestRow } from './row';

interface Constants {
  /** k·kp = A r^B. */
  readonly gain: readonly [a: number, b: number];
  /** τ/ti = C + D r. */
  readonly integral: readonly [c: number, d: number];
}

/**
 * Rovira et al., least error integral for set-point steps: k·kp = A r^B, τ/ti = C + D r, td/τ = E r^F, r = θ/τ.
 * The PID constants are those of a controller with the derivative on the measurement (c = 0).
 */
function rovira<const Id extends string>(
  id: Id,
  criterion: string,
  pi: Constants,
  pid: Constants & { readonly derivative: readonly [e: number, f: number] },
) {
  return defineRule({
    id,
    name: `Least ${criterion}, set-point`,
    types: ['PI', 'PID'],
    aim: `Set-point: the least ${criterion}.`,
    form: 'ideal',
    validity:
      'First-order plants with dead time, 0.1 ≤ θ/τ ≤ 1; PID with the derivative on the measurement (c = 0).',
    source: 'Rovira, Murrill & Smith, Instruments and Control Systems 42(12) (1969) 67–69',
    deadTimeRatio: [0.1, 1],
    setting: null,
    variants: [],
    rows: [
      stepTestRow('PI', (k, tau, theta) => ideal(gain(pi, k, theta / tau), integral(pi, tau, theta))),
      stepTestRow('PID', (k, tau, theta) =>
        ideal(
          gain(pid, k, theta / tau),
          integral(pid, tau, theta),
          tau * pid.derivative[0] * (theta / tau) ** pid.derivative[1],
        ),
      ),
    ],
  });
}

function gain({ gain: [a, b] }: Constants, k: number, ratio: number): number {
  return (a * ratio ** b) / k;
}

function integral({ integral: [c, d] }: Constants, tau: number, theta: number): number {
  return tau / (c + (d * theta) / tau);
}

export const iaeSetpoint = rovira(
  'iae-setpoint',
  'IAE',
  { gain: [0.758, -0.861], integral: [1.02, -0.323] },
  { gain: [1.086, -0.869], integral: [0.74, -0.13], derivative: [0.348, 0.914] },
);

export const itaeSetpoint = rovira(
  'itae-setpoint',
  'ITAE',
  { gain: [0.586, -0.916], integral: [1.03, -0.165] },
  { gain: [0.965, -0.85], integral: [0.796, -0.1465], derivative: [0.308, 0.929] },
);
