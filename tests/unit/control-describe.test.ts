import { describe, expect, it } from 'vitest';
import { describePlant } from '@/lib/control/describe';
import { controllerTransfer, openLoop } from '@/lib/control/loop';
import { evaluateReal } from '@/lib/control/polynomial';
import { idealController } from '@/lib/control/types';

describe('describePlant', () => {
  it('names an overdamped second order', () => {
    const found = describePlant({ num: [2420], den: [1, 118.8, 1936], deadTimeS: 0.003 });
    expect(found).toMatchObject({
      dcGain: 1.25,
      order: 2,
      integrators: 0,
      relativeDegree: 2,
      stable: true,
      deadTimeS: 0.003,
    });
    // Sum and product of the poles stand in the denominator.
    expect(found.poles[0].re + found.poles[1].re).toBeCloseTo(-118.8, 12);
    expect(found.poles[0].re * found.poles[1].re).toBeCloseTo(1936, 9);
    expect(found.oscillatoryModes).toEqual([]);
  });

  it('finds natural frequency and damping of each pair', () => {
    const { oscillatoryModes } = describePlant({ num: [1], den: [1, 0.2, 100, 0, 0], deadTimeS: 0 });
    expect(oscillatoryModes).toHaveLength(1);
    expect(oscillatoryModes[0].naturalFrequency).toBeCloseTo(10, 12);
    expect(oscillatoryModes[0].dampingRatio).toBeCloseTo(0.01, 12);
  });

  it.each([
    [[1], [1, 0], Infinity, 1, false],
    [[-3], [2, 0, 0], -Infinity, 2, false],
    [[2, 0], [1, 1], 0, 0, true],
    [[2, 0], [1, 1, 0], 2, 1, false],
    [[0], [1, 1], 0, 0, true],
    [[1], [1, -1], -1, 0, false],
    [[1], [1, 0, 1], 1, 0, false],
    [[0, 4], [0, 2, 2], 2, 0, true],
  ])('static gain and integrators of %j/%j', (num, den, dcGain, integrators, stable) => {
    expect(describePlant({ num, den, deadTimeS: 0 })).toMatchObject({ dcGain, integrators, stable });
  });

  it('refuses an improper plant', () => {
    expect(() => describePlant({ num: [1, 0, 0], den: [1, 1], deadTimeS: 0 })).toThrow(/degree of num/);
    expect(() => describePlant({ num: [1], den: [0], deadTimeS: 0 })).toThrow(/den must not be zero/);
  });
});

describe('openLoop', () => {
  it('is kp·(1 + 1/(ti·s) + td·s/(1 + td·s/n)) times plant and filter, at s = 2', () => {
    const controller = idealController({
      kp: 3,
      ti: 4,
      td: 0.5,
      n: 5,
      filter: { timeConstantS: 0.2, order: 1 },
    });
    const { num, den, deadTimeS } = openLoop({ num: [7], den: [1, 1], deadTimeS: 0.4 }, controller);
    const byHand = 3 * (1 + 1 / 8 + 1 / (1 + 0.2)) * (7 / 3) * (1 / 1.4);
    expect(evaluateReal(num, 2) / evaluateReal(den, 2)).toBeCloseTo(byHand, 12);
    expect(deadTimeS).toBe(0.4);
  });

  it('has as many poles as terms', () => {
    expect(controllerTransfer(idealController({ kp: 2 }))).toEqual({ num: [2], den: [1] });
    expect(controllerTransfer(idealController({ kp: 2, ti: 4 }))).toEqual({ num: [2, 0.5], den: [1, 0] });
    expect(controllerTransfer(idealController({ kp: 2, td: 3, n: Infinity }))).toEqual({
      num: [6, 2],
      den: [1],
    });
  });
});
