/** Mix-ups met in the field (minutes for seconds, band for gain, …): common practice. */
import { describe, expect, it } from 'vitest';
import { explainMixUp, type MixUpContext } from '../../lib/control/forms';

const context: MixUpContext = { kp: 1.55, sampleTimeS: 0.02, inputSpan: 250, outputSpan: 100 };

describe('explainMixUp', () => {
  it.each<[string, number, number, MixUpContext, RegExp]>([
    ['seconds for minutes', 90, 1.5, {}, /60 times too large: seconds where minutes/],
    ['minutes for seconds', 1.5, 90, {}, /60 times too small: minutes where seconds/],
    ['per hour for per second', 7200, 2, {}, /3600 times too large/],
    ['band for gain', 50, 2, {}, /100 divided by the value: a proportional band/],
    ['time for rate', 0.25, 4, {}, /1 divided by the value: a time and a rate/],
    ['seconds for repeats per minute', 90, 0.6667, {}, /60 divided by the value/],
    ['units for per cent', 0.8, 2, context, /ratio of the spans \(2\.5\) is left out/],
    ['per cent for units', 2, 0.8, context, /ratio of the spans \(2\.5\) is in it/],
    ['integral time for integral gain', 0.062, 25, context, /integral time and an integral gain/],
    ['parallel for ideal', 38.75, 25, context, /times the proportional gain/],
    ['ideal for parallel', 16.13, 25, context, /divided by the proportional gain/],
    ['per sample for per second', 0.5, 25, context, /sample time is in it/],
    ['per second for per sample', 25, 0.5, context, /sample time is left out/],
    [
      'swapped fields',
      18,
      90,
      { others: { 'Derivative time': 18 } },
      /the value of "Derivative time": are two fields swapped/,
    ],
    ['lost sign', -2, 2, {}, /the sign is not/],
    ['decimal mark', 155, 15.5, {}, /10 times too large: is the decimal mark/],
  ])('names %s', (_, typed, expected, given, sentence) => {
    expect(explainMixUp(typed, expected, given)).toMatch(sentence);
  });

  it('says nothing of numbers that agree or that nothing explains', () => {
    expect(explainMixUp(1.551, 1.55)).toBeNull();
    expect(explainMixUp(3.7, 1.55)).toBeNull();
    expect(explainMixUp(0, 1.55)).toBeNull();
    expect(explainMixUp(5, 0)).toBeNull();
    expect(explainMixUp(Infinity, 5)).toBeNull();
  });
});
