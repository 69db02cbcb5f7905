import { ideal, series } from './native';
import { defineRule, row } from './row';

/**
 * Ziegler–Nichols, ultimate gain: P 0.5 Ku · PI 0.45 Ku, Tu/1.2 · PID 0.6 Ku, Tu/2, Tu/8.
 * Several textbooks print the roundings Ku/2.2 and Ku/1.7; Smith & Corripio use the latter for the series form.
 */
export const znUltimate = defineRule({
  id: 'zn-ultimate',
  name: 'Ziegler–Nichols, ultimate gain',
  types: ['P', 'PI', 'PID'],
  aim: 'Load: each swing a quarter of the one before.',
  form: 'ideal',
  validity: 'Stable or integrating plants that a proportional controller can bring to steady oscillation.',
  source:
    'Ziegler & Nichols, Optimum settings for automatic controllers, Transactions of the ASME 64 (1942) 759–768',
  setting: null,
  variants: [
    {
      id: 'rounded',
      name: 'PI Ku/2.2, PID Ku/1.7',
      source:
        'Ziegler & Nichols 1942 as Stephanopoulos, Chemical Process Control, 1984, rounds it (from memory)',
    },
    {
      id: 'rounded-series',
      name: 'PID Ku/1.7 in the series form',
      source: 'Ziegler & Nichols 1942 as Smith & Corripio read it for the series PID (from memory)',
    },
  ],
  rows: [
    row('ultimate', 'P', { settings: ({ ku }) => ideal(0.5 * ku) }),
    row('ultimate', 'PI', { settings: ({ ku, tu }) => ideal(0.45 * ku, tu / 1.2) }),
    row('ultimate', 'PID', { settings: ({ ku, tu }) => ideal(0.6 * ku, tu / 2, tu / 8) }),
    row('ultimate', 'PI', { variant: 'rounded', settings: ({ ku, tu }) => ideal(ku / 2.2, tu / 1.2) }),
    row('ultimate', 'PID', { variant: 'rounded', settings: ({ ku, tu }) => ideal(ku / 1.7, tu / 2, tu / 8) }),
    row('ultimate', 'PID', {
      variant: 'rounded-series',
      settings: ({ ku, tu }) => series(ku / 1.7, tu / 2, tu / 8),
    }),
  ],
});
