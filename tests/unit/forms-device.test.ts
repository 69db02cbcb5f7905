import { describe, expect, it } from 'vitest';
import {
  convert,
  fromDevice,
  idealToCascade,
  idealToSeries,
  toDevice,
  type Convention,
} from '../../lib/control/forms';
import { idealController } from '../../lib/control/types';

const controller = idealController({ kp: 0.8, ti: 90, td: 18 });
const axis = { input: '°C', output: '%' };
const ideal: Convention = { form: 'ideal', gain: 'gain', integral: 'seconds', derivative: 'seconds' };

function rowsOf(given: Parameters<typeof toDevice>[0], convention: Convention) {
  const device = toDevice(given, convention, axis);
  if (!device.ok) throw new Error(device.message);
  return device.value;
}

describe('toDevice', () => {
  it('labels every row in trade words, with unit and direction', () => {
    const { rows } = rowsOf(controller, {
      form: 'ideal',
      gain: 'proportional-band',
      integral: 'repeats-per-minute',
      derivative: 'minutes',
      inputSpan: 250,
      outputSpan: 100,
    });
    expect(
      rows.map(({ name, label, text, unit, direction }) => [name, label, text, unit, direction]),
    ).toEqual([
      ['p', 'Proportional band', '50', '% of span', 'larger = weaker'],
      ['i', 'Reset rate', '0.666667', 'repeats/min', 'larger = stronger'],
      ['d', 'Derivative time', '0.3', 'min', 'larger = stronger'],
    ]);
  });

  it('rounds to the device and says by how much', () => {
    const { rows, warnings } = rowsOf(controller, {
      ...ideal,
      integral: 'minutes',
      step: { p: 0.05, i: 0.4 },
      decimals: { d: 2 },
    });
    expect(rows.map(({ text }) => text)).toEqual(['0.80', '1.6', '18.00']);
    expect(rows[1].relativeRounding).toBeCloseTo(1 / 15, 12);
    expect(warnings[0]).toBe('Integral time is rounded by 6.67 % to the resolution of the device.');
  });

  it('sees a gain that rounds to nothing, onto the off code or out of range', () => {
    const small = idealController({ kp: 0.8, ti: 90, td: 0.2 });
    const { rows, warnings } = rowsOf(small, {
      ...ideal,
      decimals: 0,
      offCodes: { i: 90 },
      limits: { p: { low: 1.5 } },
    });
    expect(rows.map(({ roundsToOff }) => roundsToOff)).toEqual([false, true, true]);
    expect(rows[0]).toMatchObject({ value: 1, outsideLimits: true });
    expect(warnings.join(' ')).toContain('P gain of 1 % per °C is outside the range of the device.');
    expect(warnings.join(' ')).toContain(
      'Derivative time comes out as 0, which is no action at all or the code for off.',
    );
  });

  it('never shows an off term without what it means', () => {
    const onlyP = idealController({ kp: 2 });
    const coded = rowsOf(onlyP, { ...ideal, offCodes: { i: 9999 } }).rows;
    expect(coded[1]).toMatchObject({ value: 9999, text: '9999', off: 'off: enter 9999', isOff: true });
    expect(coded[2]).toMatchObject({ value: 0, text: '0', off: 'off: enter 0', isOff: true });
    const rate = rowsOf(onlyP, { ...ideal, integral: 'repeats-per-minute' }).rows;
    expect(rate[1]).toMatchObject({ value: 0, off: 'off: enter 0', isOff: true });
    const unknown = rowsOf(onlyP, ideal);
    expect(unknown.rows[1]).toMatchObject({ value: Infinity, text: '∞', isOff: true });
    expect(unknown.warnings).toEqual([
      'Integral time: the integral is off, but the convention does not say what the device takes for off.',
    ]);
  });

  it('refuses what the device cannot carry, with the reason', () => {
    const refusal = (given: Parameters<typeof toDevice>[0], convention: Convention) => {
      const device = toDevice(given, convention, axis);
      return device.ok ? null : device;
    };
    expect(refusal(controller, { ...ideal, gain: 'proportional-band' })).toMatchObject({
      code: 'SPAN_NEEDED',
    });
    expect(refusal(controller, { ...ideal, integral: 'per-sample' })?.message).toBe(
      'I gain in this unit needs the sample time of the controller in seconds, above 0.',
    );
    expect(refusal(controller, { ...ideal, derivative: 'per-sample', sampleTimeS: 0 })?.code).toBe(
      'SAMPLE_TIME_NEEDED',
    );
    expect(refusal(controller, { ...ideal, gain: 'counts', inputSpan: 1, outputSpan: 1 })?.code).toBe(
      'COUNTS_NEEDED',
    );
    expect(refusal({ ...controller, kp: 0 }, ideal)?.code).toBe('ZERO_GAIN');
    const tooMuch = refusal(idealController({ kp: 1, ti: 40, td: 18 }), { ...ideal, form: 'series' });
    expect(tooMuch).toMatchObject({ code: 'NO_SERIES_FORM', closest: { kp: 1, ti: 40, td: 10 } });
    expect(tooMuch?.message).toContain('reduce the derivative time to 10 s');
    if (tooMuch?.closest) expect(idealToSeries(tooMuch.closest).ok).toBe(true);
  });

  it('blocks every wrong pair of gain sign and action', () => {
    const answer = (kp: number, action: 'direct' | 'reverse') => {
      const device = toDevice({ ...controller, kp }, { ...ideal, action }, axis);
      return device.ok ? device.value.rows[0].value : device.code;
    };
    expect(answer(0.8, 'reverse')).toBe(0.8);
    expect(answer(-0.8, 'direct')).toBe(0.8);
    expect(answer(0.8, 'direct')).toBe('WRONG_ACTION');
    expect(answer(-0.8, 'reverse')).toBe('WRONG_ACTION');
    expect(rowsOf({ ...controller, kp: -0.8 }, ideal).warnings).toContain(
      'The gain is negative: the loop needs direct action (measurement up, output up).',
    );
  });

  it('puts a unit on every number even when the axis has none', () => {
    const device = toDevice(controller, ideal, { input: '', output: ' ' });
    expect(device.ok && device.value.rows.map(({ unit }) => unit)).toEqual([
      'output unit per input unit',
      's',
      's',
    ]);
  });
});

describe('fromDevice', () => {
  it('reads as-found values without retyping', () => {
    const band: Convention = {
      form: 'ideal',
      gain: 'proportional-band',
      integral: 'repeats-per-minute',
      derivative: 'minutes',
      inputSpan: 250,
      outputSpan: 100,
    };
    const read = fromDevice({ p: 50, i: 40 / 60, d: 0.3 }, band);
    if (!read.ok) throw new Error(read.message);
    expect(read.value.kp).toBeCloseTo(0.8, 14);
    expect(read.value.ti).toBeCloseTo(90, 12);
    expect(read.value.td).toBeCloseTo(18, 14);
    expect(read.value).toMatchObject({ n: 10, b: 1, c: 0 });
    expect(fromDevice({ p: 50 }, band)).toMatchObject({ ok: true, value: { ti: Infinity, td: 0 } });
  });

  it('refuses numbers that make no controller', () => {
    const code = (values: Parameters<typeof fromDevice>[0], convention: Partial<Convention> = {}) => {
      const read = fromDevice(values, { ...ideal, ...convention });
      return read.ok ? read.value : read.code;
    };
    expect(code({ i: 1 })).toBe('MISSING_VALUE');
    expect(code({ p: 0, i: 1 })).toBe('IMPOSSIBLE_VALUE');
    expect(code({ p: 1, i: 0 })).toBe('IMPOSSIBLE_VALUE');
    expect(code({ p: 1, i: -4 })).toBe('IMPOSSIBLE_VALUE');
    expect(code({ p: 1, i: NaN })).toBe('IMPOSSIBLE_VALUE');
    expect(code({ p: 1, i: 4, d: -1 })).toBe('IMPOSSIBLE_VALUE');
    expect(code({ p: -1, i: 4 }, { action: 'reverse' })).toBe('IMPOSSIBLE_VALUE');
    expect(code({ p: 1, i: -0.1 }, { form: 'parallel', integral: 'gain' })).toBe('IMPOSSIBLE_VALUE');
    expect(code({ p: 1, i: 10, d: 1, f: 5 }, { form: 'series', filter: 'seconds' })).toBe('NO_IDEAL_FORM');
    expect(code({ p: 1, i: 0 }, { offCodes: { i: 0 } })).toMatchObject({ ti: Infinity });
  });
});

describe('convert', () => {
  it('reads the rounded numbers back, with weights and filter kept', () => {
    const given = { ...controller, b: 0.4, n: 8, filter: { timeConstantS: 1, order: 2 as const } };
    const answer = convert(given, { ...ideal, integral: 'minutes', step: { i: 0.4 } }, axis);
    if (!answer.ok) throw new Error(answer.message);
    expect(answer.value.readBack).toEqual({ ...given, ti: 96 });
    expect(answer.value.rounding.largest).toBeCloseTo(1 / 15, 12);
    expect(Object.keys(answer.value.rounding.relative)).toEqual(['p', 'i', 'd']);
  });

  it('has no way back from a gain that rounded to nothing', () => {
    const answer = convert(idealController({ kp: 0.0004 }), { ...ideal, decimals: 3 }, axis);
    if (!answer.ok) throw new Error(answer.message);
    expect(answer.value.readBack).toBeNull();
    expect(answer.value.warnings.some((warning) => warning.startsWith('Read back:'))).toBe(true);
  });
});

describe('idealToCascade', () => {
  it('refuses without derivative or with too much of it', () => {
    expect(idealToCascade(idealController({ kp: 1, ti: 1 }))).toMatchObject({
      ok: false,
      code: 'NO_CASCADE_FORM',
    });
    expect(idealToCascade(idealController({ kp: 1, ti: 1, td: 0.5 }))).toMatchObject({
      code: 'NO_CASCADE_FORM',
      closest: { td: 0.25 },
    });
  });
});
