import type { Convention } from '@/lib/control/forms';

const FORMS = { ideal: 'ideal form', parallel: 'parallel form', series: 'series form' } as const;
const GAINS: Record<Convention['gain'], string> = {
  gain: 'gain',
  'proportional-band': 'proportional band in %',
  'throttling-range': 'proportional band in units',
  'percent-per-unit': '% per unit',
  'fraction-per-unit': 'share of output per unit',
  counts: 'counts',
};
const INTEGRALS: Record<Convention['integral'], string> = {
  seconds: 'seconds',
  milliseconds: 'milliseconds',
  minutes: 'minutes',
  'repeats-per-second': 'repeats per second',
  'repeats-per-minute': 'repeats per minute',
  'repeats-per-hour': 'repeats per hour',
  gain: 'I gain per second',
  'gain-per-minute': 'I gain per minute',
  'per-sample': 'per sample',
};

/** "parallel form · gain · I gain per second": a convention in the order in which a person asks for it. */
export function conventionWords(convention: Convention): string {
  return [FORMS[convention.form], GAINS[convention.gain], INTEGRALS[convention.integral]].join(' · ');
}
