import type { ParameterUnits } from './look-up';
import type { AxisUnits, Convention, DeviceName } from './types';

/** Stand-ins for an axis whose units are not stated, so that no number goes without a unit. */
export const UNNAMED_UNITS: AxisUnits = { input: 'input unit', output: 'output unit' };

/** The unit of every parameter, e.g. '% per °C', 'repeats/min', '% per °C per s', 's'. */
export function unitTexts(
  units: ParameterUnits,
  convention: Convention,
  axis: AxisUnits,
): Record<DeviceName, string> {
  const { gain, integral, derivative, filter, ground } = units;
  const percent = ground.hasSpans && gain.output === 'output';
  const axisInput = axis.input.trim() || UNNAMED_UNITS.input;
  const axisOutput = axis.output.trim() || UNNAMED_UNITS.output;
  const output = percent ? '%' : gain.output === 'output' ? axisOutput : gain.output;
  const input = percent ? '%' : gain.input === 'input' ? axisInput : gain.input;
  const isParallel = convention.form === 'parallel';
  /** ' per ' parts that a gain of another unit than 1 brings along. */
  const carriesGain = (ofGain: true | undefined) => (ofGain === true || isParallel) && output !== input;

  return { p: gainText(), i: integralText(), d: derivativeText(), f: filter?.unit ?? '' };

  function gainText(): string {
    if (!gain.band) return `${output} per ${input}`;
    return convention.gain === 'proportional-band' ? '% of span' : axisInput;
  }

  function integralText(): string {
    const { time, isTime, ofGain } = integral;
    if (isTime) return carriesGain(ofGain) ? `${time}·${input} per ${output}` : time;
    if (carriesGain(ofGain)) return `${output} per ${input} per ${time}`;
    return ofGain === true || isParallel ? `1/${time}` : `repeats/${time}`;
  }

  function derivativeText(): string {
    const { time, ofGain } = derivative;
    return carriesGain(ofGain) ? `${time}·${output} per ${input}` : time;
  }
}
