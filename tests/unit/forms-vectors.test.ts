/**
 * Test vectors worked out apart from this code with Python's floating point from the textbook conversions:
 * Kp 0.8 %/°C, Ti 90 s, Td 18 s, N 10, measurement 0–250 °C, output 0–100 %, sample time 0.5 s.
 * The conversions themselves: K. J. Åström, T. Hägglund, "Advanced PID Control" (ISA, 2006), chapter 3 (from memory),
 * and common practice for bands, repeats and counts.
 */
import { describe, expect, it } from 'vitest';
import {
  cascadeToIdeal,
  idealToCascade,
  idealToParallel,
  idealToSeries,
  POSITION_GAIN_UNITS,
  seriesToIdeal,
  toDevice,
  type Convention,
  type DeviceName,
} from '../../lib/control/forms';
import { idealController } from '../../lib/control/types';

const controller = idealController({ kp: 0.8, ti: 90, td: 18 });
const axis = { input: '°C', output: '%' };
const spans = { inputSpan: 250, outputSpan: 100 };
const base: Convention = { form: 'ideal', gain: 'gain', integral: 'seconds', derivative: 'seconds' };

function row(name: DeviceName, convention: Partial<Convention>) {
  const device = toDevice(controller, { ...base, ...convention }, axis);
  if (!device.ok) throw new Error(device.message);
  const found = device.value.rows.find((candidate) => candidate.name === name);
  if (!found) throw new Error(`no row ${name}`);
  return found;
}

/** Every digit that the vector gives. */
function expectDigits(value: number, vector: string) {
  const digits = vector.replace('.', '').replace(/^0+/, '').length;
  expect(Number(value.toPrecision(digits))).toBe(Number(vector));
}

const vectors: [DeviceName, string, string, Partial<Convention>][] = [
  ['p', '0.8', '% per °C', {}],
  ['p', '2', '% per %', spans],
  ['p', '50', '% of span', { gain: 'proportional-band', ...spans }],
  ['p', '125', '°C', { gain: 'throttling-range', outputSpan: 100 }],
  ['p', '125', '°C', { gain: 'throttling-range', ...spans }],
  ['p', '0.8', '% per °C', { gain: 'percent-per-unit', outputSpan: 100 }],
  ['p', '0.008', '1 per °C', { gain: 'fraction-per-unit', outputSpan: 100 }],
  ['p', '13.5033', 'counts per count', { gain: 'counts', inputCounts: 4095, outputCounts: 27648, ...spans }],
  ['i', '90', 's', {}],
  ['i', '90000', 'ms', { integral: 'milliseconds' }],
  ['i', '1.5', 'min', { integral: 'minutes' }],
  ['i', '0.666667', 'repeats/min', { integral: 'repeats-per-minute' }],
  ['i', '40', 'repeats/h', { integral: 'repeats-per-hour' }],
  ['i', '0.00888889', '% per °C per s', { integral: 'gain' }],
  ['i', '0.00888889', '% per °C per s', { form: 'parallel', integral: 'gain' }],
  ['i', '0.533333', '% per °C per min', { form: 'parallel', integral: 'gain-per-minute' }],
  ['i', '0.0222222', '1/s', { form: 'parallel', integral: 'gain', ...spans }],
  ['i', '0.00444444', '% per °C per sample', { integral: 'per-sample', sampleTimeS: 0.5 }],
  ['i', '112.5', 's·°C per %', { form: 'parallel', integral: 'seconds' }],
  ['i', '65.1246', 's', { form: 'series' }],
  ['d', '18', 's', {}],
  ['d', '0.3', 'min', { derivative: 'minutes' }],
  ['d', '14.4', 's·% per °C', { derivative: 'gain' }],
  ['d', '14.4', 's·% per °C', { form: 'parallel', derivative: 'seconds' }],
  ['d', '0.24', 'min·% per °C', { form: 'parallel', derivative: 'gain-minutes' }],
  ['d', '36', 's', { form: 'parallel', derivative: 'gain', ...spans }],
  ['d', '28.8', 'sample·% per °C', { derivative: 'per-sample', sampleTimeS: 0.5 }],
  ['d', '24.8754', 's', { form: 'series' }],
  ['p', '0.578885', '% per °C', { form: 'series' }],
  ['f', '10', 'ratio', { filter: 'ratio' }],
  ['f', '0.1', 'ratio', { filter: 'inverse-ratio' }],
  ['f', '1.8', 's', { filter: 'seconds' }],
  ['f', '0.0884194', 'Hz', { filter: 'hertz' }],
  ['f', '0.217391', 'share of the new value', { filter: 'smoothing-factor', sampleTimeS: 0.5 }],
];

describe('test vectors of the target conventions', () => {
  it.each(vectors)('%s = %s %s', (name, value, unit, convention) => {
    const found = row(name, convention);
    expectDigits(found.value, value);
    expect(found.unit).toBe(unit);
    expect(found.relativeRounding).toBe(0);
  });

  it('keeps per-sample integrals as whole numbers with a binary point', () => {
    const q12 = row('i', { integral: 'per-sample', sampleTimeS: 0.5, scale: 4096, integer: true });
    expect(q12.value).toBe(18);
    expect(q12.text).toBe('18');
    expectDigits(-100 * q12.relativeRounding, '1.12');
    expect(q12.unit).toBe('counts (4096 = 1 % per °C per sample)');
    const q16 = row('i', { integral: 'per-sample', sampleTimeS: 0.5, scale: { i: 65536 }, step: { i: 1 } });
    expect(q16.value).toBe(291);
    expect((-100 * q16.relativeRounding).toFixed(3)).toBe('0.093');
  });

  it('converts to the series and parallel forms', () => {
    const series = idealToSeries(controller);
    if (!series.ok) throw new Error(series.message);
    expectDigits(series.value.kc, '0.578885');
    expectDigits(series.value.tI, '65.1246');
    expectDigits(series.value.tD, '24.8754');
    const parallel = idealToParallel(controller);
    expectDigits(parallel.ki, '0.00888889');
    expectDigits(parallel.kd, '14.4');
    expectDigits(parallel.filterTimeS, '1.8');
  });

  it('takes the lag of a series controller into account', () => {
    const exact = seriesToIdeal({ form: 'series', kc: 0.5, tI: 60, tD: 20, lagS: 2 });
    if (!exact.ok) throw new Error(exact.message);
    expectDigits(exact.value.kp, '0.65');
    expectDigits(exact.value.ti, '78');
    expectDigits(exact.value.td, '13.3846');
    expectDigits(exact.value.n, '6.69231');
    const ignoring = seriesToIdeal({ form: 'series', kc: 0.5, tI: 60, tD: 20, lagS: 0 });
    if (!ignoring.ok) throw new Error(ignoring.message);
    expectDigits(ignoring.value.kp, '0.6667');
    expectDigits(ignoring.value.ti, '80');
    expectDigits(ignoring.value.td, '15');
  });

  it('converts a drive cascade both ways', () => {
    const cascade = {
      form: 'cascade',
      velocityGain: 2,
      velocityIntegralTimeS: 0.02,
      positionGain: 20,
    } as const;
    const ideal = cascadeToIdeal(cascade);
    expectDigits(ideal.kp, '140');
    expectDigits(ideal.kp / ideal.ti, '2000');
    expectDigits(ideal.kp * ideal.td, '2');
    expectDigits(ideal.ti, '0.07');
    expectDigits(ideal.td, '0.0142857');
    expectDigits(ideal.b, '0.285714');
    expect(ideal.c).toBe(0);
    const back = idealToCascade(ideal);
    if (!back.ok) throw new Error(back.message);
    expect(back.value.velocityGain).toBeCloseTo(2, 12);
    expect(back.value.velocityIntegralTimeS).toBeCloseTo(0.02, 12);
    expect(back.value.positionGain).toBeCloseTo(20, 10);
  });

  it('knows 1 (m/min)/mm = 1 (in/min)/mil = 16.667 1/s', () => {
    expectDigits(POSITION_GAIN_UNITS['metres-per-minute-per-millimetre'].perSecond, '16.667');
    expectDigits(POSITION_GAIN_UNITS['inches-per-minute-per-mil'].perSecond, '16.667');
  });
});
