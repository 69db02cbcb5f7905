import { describe, expect, it } from 'vitest';
import { bodeCurve, bodeRange, frequencyResponse } from '@/lib/control/frequency';
import { computeMargins } from '@/lib/control/margins';
import { idealController, type Plant } from '@/lib/control/types';

const plant = (num: number[], den: number[], deadTimeS = 0): Plant => ({ num, den, deadTimeS });
const logSpaced = (low: number, high: number, count: number) =>
  Array.from({ length: count }, (_, i) => low * (high / low) ** (i / (count - 1)));

describe('frequencyResponse', () => {
  it('is exact on a first-order lag with dead time: 1/√(1 + w²), -atan w - w·θ', () => {
    const omegas = logSpaced(1e-6, 1e6, 200);
    const { magnitude, phaseDeg } = frequencyResponse(plant([1], [1, 1], 3), null, omegas);
    omegas.forEach((w, i) => {
      expect(magnitude[i] * Math.hypot(1, w)).toBeCloseTo(1, 12);
      expect(phaseDeg[i] / ((-180 / Math.PI) * (Math.atan(w) + 3 * w))).toBeCloseTo(1, 12);
    });
  });

  it('unwraps whatever the spacing: eight lags end at -720°', () => {
    const lags = plant([1], [1, 8, 28, 56, 70, 56, 28, 8, 1]);
    const { phaseDeg } = frequencyResponse(lags, null, [1, 1e9]);
    expect(phaseDeg[0]).toBeCloseTo(-360, 9);
    expect(phaseDeg[1]).toBeCloseTo(-720, 5);
  });

  it.each([
    ['integrator', [1], [1, 0], -90],
    ['double integrator', [1], [1, 0, 0], -180],
    ['negative gain', [-2], [1, 1], -180],
    ['unstable lag', [1], [1, -1], -180],
    ['zero on the right', [-1, 1], [1, 1], 0],
    ['differentiating', [1, 0], [1, 1], 90],
  ])('starts at the phase of the low-frequency asymptote: %s', (_, num, den, start) => {
    expect(frequencyResponse(plant(num, den), null, [1e-9]).phaseDeg[0]).toBeCloseTo(start, 5);
  });

  it('turns by -180° across an undamped pair, as across a slightly damped one', () => {
    const { phaseDeg } = frequencyResponse(plant([1], [1, 0, 1]), null, [0.5, 2]);
    expect(phaseDeg[0]).toBeCloseTo(0, 12);
    expect(phaseDeg[1]).toBeCloseTo(-180, 12);
  });

  it('includes controller and filter', () => {
    const controller = idealController({
      kp: 2,
      ti: 4,
      td: 0.5,
      n: 8,
      filter: { timeConstantS: 0.3, order: 2 },
    });
    const w = 1.7;
    // By hand: |kp·(1 + 1/(ti·s) + td·s/(1 + td·s/n))|·|1/s|·|F| at s = jw.
    const d = { re: (0.5 * w) ** 2 / 8, im: 0.5 * w };
    const lag = 1 + ((0.5 * w) / 8) ** 2;
    const c = 2 * Math.hypot(1 + d.re / lag, d.im / lag - 1 / (4 * w));
    const f = 1 / Math.hypot(1 - (0.3 * w) ** 2 / 2, 0.3 * w);
    expect(frequencyResponse(plant([1], [1, 0]), controller, [w]).magnitude[0]).toBeCloseTo((c * f) / w, 12);
  });

  it('has the limits at w = 0', () => {
    expect(frequencyResponse(plant([3], [1, 2]), null, [0]).magnitude[0]).toBeCloseTo(1.5, 12);
    expect(frequencyResponse(plant([3], [1, 0]), null, [0]).magnitude[0]).toBe(Infinity);
    expect(frequencyResponse(plant([3, 0], [1, 1]), null, [0]).magnitude[0]).toBe(0);
    expect(frequencyResponse(plant([0], [1, 1]), null, [0, 1]).magnitude).toEqual(new Float64Array(2));
  });

  it('refuses frequencies that are negative or not finite', () => {
    expect(() => frequencyResponse(plant([1], [1, 1]), null, [-1])).toThrow(RangeError);
    expect(() => frequencyResponse(plant([1], [1, 1]), null, [Infinity])).toThrow(RangeError);
  });
});

describe('bodeRange and bodeCurve', () => {
  const resonant = plant([100], [1, 0.2, 100], 0.05);
  const controller = idealController({ kp: 0.002, ti: 0.05 });

  it('contain every crossover and corner', () => {
    const [low, high] = bodeRange(resonant, controller);
    const { gainCrossover, phaseCrossover } = computeMargins(resonant, controller);
    for (const w of [gainCrossover, phaseCrossover, 10, 1 / 0.05]) {
      expect(w).toBeGreaterThan(low);
      expect(w).toBeLessThan(high);
    }
  });

  it('draw a narrow resonance however few the points: peak 1/(2ζ√(1 - ζ²)) at ζ = 0.01', () => {
    const { omega, magnitude, phaseDeg } = bodeCurve(plant([100], [1, 0.2, 100]), null, 20);
    expect(omega.length).toBe(magnitude.length);
    expect(Math.max(...magnitude)).toBeGreaterThan(0.98 * 50);
    expect(omega.every((w, i) => i === 0 || w > omega[i - 1])).toBe(true);
    expect(phaseDeg.every((value, i) => i === 0 || Math.abs(value - phaseDeg[i - 1]) < 45)).toBe(true);
  });

  it('exist for loops without a corner or without gain', () => {
    expect(bodeRange(plant([2], [1]), null)).toEqual([0.1, 10]);
    expect(bodeRange(plant([1], [1, 1]), idealController({ kp: 0 }))).toEqual([0.1, 10]);
    expect(() => bodeCurve(resonant, null, 1)).toThrow(RangeError);
  });
});
