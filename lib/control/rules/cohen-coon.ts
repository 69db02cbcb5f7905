import { ideal } from './native';
import { defineRule, stepTestRow } from './row';

/**
 * Cohen–Coon. With g = τ/(kθ) and r = θ/τ: P g(1 + r/3) · PI g(0.9 + r/12), θ(30 + 3r)/(9 + 20r) ·
 * PD g(5/4 + r/6), θ(6 − 2r)/(22 + 3r) · PID g(4/3 + r/4), θ(32 + 6r)/(13 + 8r), 4θ/(11 + 2r).
 * Variant 'ah': the same rule in terms of θ/(θ + τ), as tabulated in 1995; the two differ by a few per cent.
 */
export const cohenCoon = defineRule({
  id: 'cohen-coon',
  name: 'Cohen–Coon',
  types: ['P', 'PI', 'PD', 'PID'],
  aim: 'Load: each swing a quarter of the one before, also with a larger dead time.',
  form: 'ideal',
  validity:
    'First-order plants with dead time, θ/τ up to about 1; the least robust of the quarter-decay rules.',
  source: 'Cohen & Coon, Transactions of the ASME 75 (1953) 827–834',
  deadTimeRatio: [0, 1],
  setting: null,
  variants: [
    {
      id: 'ah',
      name: 'Tabulation of Åström & Hägglund 1995',
      source:
        'Cohen & Coon, Transactions of the ASME 75 (1953) 827–834, as tabulated by Åström & Hägglund 1995',
    },
  ],
  rows: [
    original('P', (g, r) => ideal(g * (1 + r / 3))),
    original('PI', (g, r, theta) => ideal(g * (0.9 + r / 12), (theta * (30 + 3 * r)) / (9 + 20 * r))),
    original('PD', (g, r, theta) =>
      ideal(g * (5 / 4 + r / 6), Infinity, (theta * (6 - 2 * r)) / (22 + 3 * r)),
    ),
    original('PID', (g, r, theta) =>
      ideal(g * (4 / 3 + r / 4), (theta * (32 + 6 * r)) / (13 + 8 * r), (4 * theta) / (11 + 2 * r)),
    ),
    tabulated('P', (g, x) => ideal(g * (1 + (0.35 * x) / (1 - x)))),
    tabulated('PI', (g, x, theta) =>
      ideal(0.9 * g * (1 + (0.092 * x) / (1 - x)), (theta * (3.3 - 3 * x)) / (1 + 1.2 * x)),
    ),
    tabulated('PD', (g, x, theta) =>
      ideal(1.24 * g * (1 + (0.13 * x) / (1 - x)), Infinity, (theta * (0.27 - 0.36 * x)) / (1 - 0.87 * x)),
    ),
    tabulated('PID', (g, x, theta) =>
      ideal(
        1.35 * g * (1 + (0.18 * x) / (1 - x)),
        (theta * (2.5 - 2 * x)) / (1 - 0.39 * x),
        (theta * (0.37 - 0.37 * x)) / (1 - 0.81 * x),
      ),
    ),
  ],
});

type Formula = (g: number, x: number, theta: number) => ReturnType<typeof ideal>;

function original(type: 'P' | 'PI' | 'PD' | 'PID', formula: Formula) {
  return stepTestRow(type, (k, tau, theta) => formula(tau / (k * theta), theta / tau, theta));
}

function tabulated(type: 'P' | 'PI' | 'PD' | 'PID', formula: Formula) {
  return stepTestRow(type, (k, tau, theta) => formula(tau / (k * theta), theta / (theta + tau), theta), 'ah');
}
