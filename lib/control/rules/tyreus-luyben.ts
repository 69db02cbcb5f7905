import { ideal } from './native';
import { defineRule, row } from './row';

/** Tyreus–Luyben: PI Ku/3.2, 2.2 Tu · PID Ku/2.2, 2.2 Tu, Tu/6.3. */
export const tyreusLuyben = defineRule({
  id: 'tyreus-luyben',
  name: 'Tyreus–Luyben',
  types: ['PI', 'PID'],
  aim: 'Load, with less oscillation than Ziegler–Nichols.',
  form: 'ideal',
  validity: 'Integrating plants and plants whose lag is much longer than their dead time.',
  source:
    'Tyreus & Luyben, Industrial & Engineering Chemistry Research 31 (1992) 2625–2628; PID: Luyben & Luyben, Essentials of Process Control, 1997',
  setting: null,
  variants: [],
  rows: [
    row('ultimate', 'PI', { settings: ({ ku, tu }) => ideal(ku / 3.2, 2.2 * tu) }),
    row('ultimate', 'PID', { settings: ({ ku, tu }) => ideal(ku / 2.2, 2.2 * tu, tu / 6.3) }),
  ],
});
