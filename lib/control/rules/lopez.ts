import { ideal } from './native';
import { defineRule, stepTestRow } from './row';

/** Coefficient and exponent of a power law A·(θ/τ)^B. */
type Power = readonly [coefficient: number, exponent: number];

interface Constants {
  readonly p: Power;
  readonly pi: readonly [gain: Power, integral: Power];
  readonly pid: readonly [gain: Power, integral: Power, derivative: Power];
}

/**
 * López et al., least error integral for load steps: k·kp = A r^B, τ/ti = C r^D, td/τ = E r^F, r = θ/τ.
 * Sources differ in the third digit of some exponents.
 */
function lopez<const Id extends string>(id: Id, criterion: string, { p, pi, pid }: Constants) {
  return defineRule({
    id,
    name: `Least ${criterion}, load`,
    types: ['P', 'PI', 'PID'],
    aim: `Load: the least ${criterion}.`,
    form: 'ideal',
    validity: 'First-order plants with dead time, 0.1 ≤ θ/τ ≤ 1; little robustness.',
    source: 'López, Miller, Smith & Murrill, Instrumentation Technology 14(11) (1967) 57–62',
    deadTimeRatio: [0.1, 1],
    setting: null,
    variants: [],
    rows: [
      stepTestRow('P', (k, tau, theta) => ideal(power(p, theta / tau) / k)),
      stepTestRow('PI', (k, tau, theta) =>
        ideal(power(pi[0], theta / tau) / k, tau / power(pi[1], theta / tau)),
      ),
      stepTestRow('PID', (k, tau, theta) =>
        ideal(
          power(pid[0], theta / tau) / k,
          tau / power(pid[1], theta / tau),
          tau * power(pid[2], theta / tau),
        ),
      ),
    ],
  });
}

function power([coefficient, exponent]: Power, ratio: number): number {
  return coefficient * ratio ** exponent;
}

export const iseLoad = lopez('ise-load', 'ISE', {
  p: [1.411, -0.917],
  pi: [
    [1.305, -0.959],
    [0.492, -0.739],
  ],
  pid: [
    [1.495, -0.945],
    [1.101, -0.771],
    [0.56, 1.006],
  ],
});

export const iaeLoad = lopez('iae-load', 'IAE', {
  p: [0.902, -0.985],
  pi: [
    [0.984, -0.986],
    [0.608, -0.707],
  ],
  pid: [
    [1.435, -0.921],
    [0.878, -0.749],
    [0.482, 1.137],
  ],
});

export const itaeLoad = lopez('itae-load', 'ITAE', {
  p: [0.49, -1.084],
  pi: [
    [0.859, -0.977],
    [0.674, -0.68],
  ],
  pid: [
    [1.357, -0.947],
    [0.842, -0.738],
    [0.381, 0.995],
  ],
});
