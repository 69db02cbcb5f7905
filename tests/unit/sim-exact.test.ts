import { describe, expect, it } from 'vitest';
import { idealController, type IdealController, type Plant } from '../../lib/control/types';
import { ExactRefused, simulateExact } from '../../lib/sim/exact';

const plant = (num: number[], den: number[], deadTimeS = 0): Plant => ({ num, den, deadTimeS });

describe('simulateExact against closed forms', () => {
  it('P on a first-order lag: one exponential', () => {
    // Gain 2, lag 5 s, kp 3: loop gain 6, y = 6/7·(1 − e^(−t/τ)) with τ = 5/7 s; u = 3·(1 − y).
    const horizonS = 8;
    const [yss, tau] = [6 / 7, 5 / 7];
    const { setpoint, load } = simulateExact(plant([2], [5, 1]), idealController({ kp: 3 }), { horizonS });
    const settled = 1 - Math.exp(-horizonS / tau);
    expect(setpoint.final).toBeCloseTo(yss, 12);
    expect(setpoint.steadyError).toBeCloseTo(1 / 7, 12);
    expect(setpoint.overshootPct).toBe(0);
    expect(setpoint.peakTimeS).toBeNull();
    expect(setpoint.riseTimeS).toBeCloseTo(tau * Math.log(9), 4);
    expect(setpoint.settlingTimeS).toBeCloseTo(tau * Math.log(50), 4);
    expect(setpoint.iae).toBeCloseTo(horizonS / 7 + yss * tau * settled, 5);
    expect(setpoint.controlPeak).toBeCloseTo(3, 12);
    expect(setpoint.totalVariation).toBeCloseTo(3 + 3 * yss * settled, 5);
    setpoint.t.forEach((t, i) => expect(setpoint.y[i]).toBeCloseTo(yss * (1 - Math.exp(-t / tau)), 5));
    // The load meets the same pole: 2/7 of it stays, y only creeps up to that.
    expect(load.final).toBeCloseTo(2 / 7, 12);
    expect(load.peakTimeS).toBeNull();
    expect(load.peak).toBeCloseTo((2 / 7) * settled, 5);
  });

  it('P on a double lag: overshoot and peak of a second-order system', () => {
    // 8/((s + 1)² + 8): ωn = 3, ζ = 1/3; overshoot e^(−πζ/√(1−ζ²)) at π/ωd, ωd = √8.
    const { setpoint } = simulateExact(plant([1], [1, 2, 1]), idealController({ kp: 8 }), { horizonS: 10 });
    expect(setpoint.overshootPct).toBeCloseTo(100 * Math.exp(-Math.PI / Math.sqrt(8)), 2);
    expect(setpoint.peakTimeS).toBeCloseTo(Math.PI / Math.sqrt(8), 4);
  });

  it('P on bare dead time: a staircase whose steps are jumps', () => {
    // Dead time 1 s, kp 0.5: y on [k, k+1) is (1 − (−1/2)^k)/3, u = 0.5·(1 − y).
    const horizonS = 12.5;
    const { setpoint, load } = simulateExact(plant([1], [1], 1), idealController({ kp: 0.5 }), {
      horizonS,
      points: 126,
    });
    const stair = (k: number) => (1 - (-0.5) ** k) / 3;
    // Judged half way between the jumps.
    for (let k = 0; k < 12; k += 1) expect(setpoint.y[10 * k + 5]).toBeCloseTo(stair(k), 12);
    expect(setpoint.riseTimeS).toBe(0);
    expect(setpoint.overshootPct).toBeCloseTo(50, 10);
    expect(setpoint.peakTimeS).toBeCloseTo(1, 12);
    const jumps = Array.from({ length: 12 }, (_, k) => Math.abs(stair(k + 1) - stair(k)));
    expect(setpoint.totalVariation).toBeCloseTo(0.5 + 0.5 * jumps.reduce((a, b) => a + b), 10);
    expect(load.y[5]).toBe(0);
    expect(load.peak).toBeCloseTo(1, 12);
  });

  it('follows the first dead time of a lag open-loop, to the moment', () => {
    // Until 2·0.8 s the plant has only seen kp (and the ramp kp·t/ti): y = kp·[x + (t − x)/ti], t from the dead time on.
    const [kp, ti, deadTimeS] = [0.6, 1.5, 0.8];
    const { setpoint } = simulateExact(plant([1], [1, 1], deadTimeS), idealController({ kp, ti }), {
      horizonS: 16,
      points: 1601,
    });
    for (let i = 0; i <= 160; i += 1) {
      const t = Math.max(0, setpoint.t[i] - deadTimeS);
      const lagged = 1 - Math.exp(-t);
      expect(setpoint.y[i]).toBeCloseTo(kp * (lagged + (t - lagged) / ti), 6);
    }
  });

  it('solves the algebraic loop of a biproper plant at 0+', () => {
    // Direct gain 0.3, kp 2, b 0.6: u = 1.2 − 2·0.3·u, hence u(0+) = 0.75 and y(0+) = 0.225.
    const gains = idealController({ kp: 2, ti: 0.7, b: 0.6 });
    const { setpoint } = simulateExact(plant([0.3, 1], [1, 1]), gains, { horizonS: 10 });
    expect(setpoint.u[0]).toBeCloseTo(0.75, 12);
    expect(setpoint.y[0]).toBeCloseTo(0.225, 12);
  });
});

describe('simulateExact over time scales', () => {
  /** The same loop with every time multiplied. */
  const slowed = (p: Plant, c: IdealController, k: number): [Plant, IdealController] => {
    const stretch = (q: readonly number[]) => q.map((value, i) => value * k ** (q.length - 1 - i));
    return [
      { num: stretch(p.num), den: stretch(p.den), deadTimeS: p.deadTimeS * k },
      { ...c, ti: c.ti * k, td: c.td * k },
    ];
  };

  it('gives the same figures from 1e-5 s to 1e5 s', () => {
    const loops: [Plant, IdealController, number][] = [
      [plant([1], [0.4, 1.4, 1]), idealController({ kp: 6, ti: 1.2, td: 0.25, b: 0.7 }), 7.7],
      [plant([1], [1, 1], 0.3), idealController({ kp: 2, ti: 1, td: 0.1 }), 7.7],
    ];
    for (const [p, c, horizonS] of loops) {
      const one = simulateExact(p, c, { horizonS });
      for (const k of [1e-6, 1e-3, 1e2, 1.3e4]) {
        const { setpoint, load } = simulateExact(...slowed(p, c, k), { horizonS: horizonS * k });
        expect(setpoint.overshootPct).toBeCloseTo(one.setpoint.overshootPct, 3);
        expect((setpoint.settlingTimeS ?? 0) / k / (one.setpoint.settlingTimeS ?? 0)).toBeCloseTo(1, 4);
        expect(setpoint.iae / k / one.setpoint.iae).toBeCloseTo(1, 5);
        expect(setpoint.itae / k ** 2 / one.setpoint.itae).toBeCloseTo(1, 5);
        expect(load.peak / one.load.peak).toBeCloseTo(1, 5);
      }
    }
  });

  it('meets the loop without dead time as the dead time goes to a 20,000th of the horizon', () => {
    const controller = idealController({ kp: 6, ti: 1.2, td: 0.25, b: 0.7 });
    const horizonS = 7.7;
    const peak = (deadTimeS: number) =>
      simulateExact(plant([1], [0.4, 1.4, 1], deadTimeS), controller, { horizonS }).load.peak;
    const none = peak(0);
    const [short, shorter] = [peak(horizonS / 20_000) - none, peak(horizonS / 40_000) - none];
    expect(Math.abs(short / none)).toBeLessThan(2e-3);
    // What a short dead time changes is in proportion to it.
    expect(short / shorter).toBeCloseTo(2, 1);
  });
});

describe('simulateExact refuses', () => {
  const loop = [plant([1], [1, 1]), idealController({ kp: 1 })] as const;

  it('options outside their range', () => {
    expect(() => simulateExact(...loop, { horizonS: 0 })).toThrow(RangeError);
    expect(() => simulateExact(...loop, { horizonS: Infinity })).toThrow(RangeError);
    expect(() => simulateExact(...loop, { horizonS: 1, points: 1 })).toThrow(RangeError);
    expect(() => simulateExact(...loop, { horizonS: 1, sampleTimeS: -1 })).toThrow(RangeError);
    expect(() => simulateExact(...loop, { horizonS: 1, actuator: { low: 1, high: 0 } })).toThrow(RangeError);
  });

  it('a loop that grows without bound, in good time', () => {
    const unstable = [plant([1], [1, 1], 1), idealController({ kp: 50 })] as const;
    expect(() => simulateExact(...unstable, { horizonS: 1e4 })).toThrow(ExactRefused);
  });
});
