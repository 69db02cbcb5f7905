import { describe, expect, it } from 'vitest';
import { loadMetrics, setpointMetrics, settledAfter, Trajectory } from '../../lib/sim/metrics';

/**
 * Figures of curves whose figures are known in closed form (textbook expressions for first and second order, worked
 * out here from the formula of the curve).
 */
type Curve = (t: number) => readonly [value: number, slope: number];
const nothing: Curve = () => [0, 0];

function trajectoryOf(y: Curve, u: Curve, times: readonly number[]): Trajectory {
  const trajectory = new Trajectory(4);
  trajectory.t[0] = times[0];
  for (let k = 1; k < times.length; k += 1) {
    const i = trajectory.add(times[k]);
    [trajectory.y0[i], trajectory.dy0[i]] = y(times[k - 1]);
    [trajectory.y1[i], trajectory.dy1[i]] = y(times[k]);
    [trajectory.u0[i], trajectory.du0[i]] = u(times[k - 1]);
    [trajectory.u1[i], trajectory.du1[i]] = u(times[k]);
  }
  return trajectory;
}

const grid = (end: number, pieces: number) =>
  Array.from({ length: pieces + 1 }, (_, i) => (i * end) / pieces);

/** A staircase: level k from time k on. */
function staircase(levels: readonly number[], signal: 'y' | 'u'): Trajectory {
  const trajectory = new Trajectory();
  levels.forEach((level, k) => {
    const i = trajectory.add(k + 1);
    if (signal === 'y') trajectory.y0[i] = trajectory.y1[i] = level;
    else trajectory.u0[i] = trajectory.u1[i] = level;
  });
  return trajectory;
}

describe('set-point figures', () => {
  it('first order, 1 − e^(−t)', () => {
    const curve: Curve = (t) => [1 - Math.exp(-t), Math.exp(-t)];
    const horizonS = 12;
    const m = setpointMetrics(trajectoryOf(curve, nothing, grid(horizonS, 300)), {
      horizonS,
      final: 1,
      points: 25,
    });
    const tail = Math.exp(-horizonS);
    expect(m.riseTimeS).toBeCloseTo(Math.log(9), 7);
    expect(m.settlingTimeS).toBeCloseTo(Math.log(50), 6);
    expect(m.iae).toBeCloseTo(1 - tail, 8);
    expect(m.ise).toBeCloseTo(0.5, 8);
    expect(m.itae).toBeCloseTo(1 - (horizonS + 1) * tail, 8);
    expect([m.overshootPct, m.peakTimeS, m.steadyError]).toEqual([0, null, 0]);
    expect(Array.from(m.t)).toEqual(grid(12, 24));
    m.t.forEach((t, i) => expect(m.y[i]).toBeCloseTo(1 - Math.exp(-t), 7));
  });

  it('second order, damping 0.2: overshoot e^(−πζ/√(1−ζ²)) at π/ω, between the samples', () => {
    const zeta = 0.2;
    const w = Math.sqrt(1 - zeta * zeta);
    const curve: Curve = (t) => [
      1 - Math.exp(-zeta * t) * (Math.cos(w * t) + (zeta / w) * Math.sin(w * t)),
      (Math.exp(-zeta * t) * Math.sin(w * t)) / w,
    ];
    const horizonS = 80;
    const m = setpointMetrics(trajectoryOf(curve, curve, grid(horizonS, 800)), {
      horizonS,
      final: 1,
      points: 2,
    });
    const peak = Math.exp((-Math.PI * zeta) / w);
    expect(m.overshootPct).toBeCloseTo(100 * peak, 4);
    expect(m.peakTimeS).toBeCloseTo(Math.PI / w, 5);
    expect(m.controlPeak).toBeCloseTo(1 + peak, 6);
    // Up to the first peak, then the swings e^(−kπζ/ω) down and up for ever: (1 + p)(1 + p + p² …).
    expect(m.totalVariation).toBeCloseTo((1 + peak) / (1 - peak), 4);
    // ∫|e| over the half periods, e = C e^(−ζt) sin(ωt + φ): a geometric series.
    const phi = Math.acos(zeta);
    const area = (from: number, to: number) => {
      const primitive = (t: number) =>
        (-Math.exp(-zeta * t) * (zeta * Math.sin(w * t + phi) + w * Math.cos(w * t + phi))) / w;
      return Math.abs(primitive(to) - primitive(from));
    };
    let iae = area(0, (Math.PI - phi) / w);
    for (let k = 1; k < 60; k += 1) iae += area((k * Math.PI - phi) / w, ((k + 1) * Math.PI - phi) / w);
    expect(m.iae).toBeCloseTo(iae, 5);
  });

  it('pure dead time: jumps give rise time 0, settle at the last jump and count in the variation', () => {
    const levels = [0, 0.5, 1.25, 0.99, 1.03, 1, 1];
    const m = setpointMetrics(staircase(levels, 'y'), { horizonS: 7, final: 1, points: 8 });
    expect([m.riseTimeS, m.settlingTimeS, m.peakTimeS]).toEqual([1, 5, 2]);
    expect(m.overshootPct).toBeCloseTo(25, 12);
    expect(m.iae).toBeCloseTo(1 + 0.5 + 0.25 + 0.01 + 0.03, 12);
    expect(m.ise).toBeCloseTo(1 + 0.25 + 0.0625 + 0.0001 + 0.0009, 12);
    // On a jump the value after it.
    expect(Array.from(m.y)).toEqual([...levels, 1]);
    const once = setpointMetrics(staircase([0, 1, 1], 'y'), { horizonS: 3, final: 1, points: 4 });
    expect(once.riseTimeS).toBe(0);
    const { totalVariation, controlPeak } = setpointMetrics(staircase([-3, 2, 2, 1], 'u'), {
      horizonS: 4,
      final: 1,
      points: 2,
    });
    expect([totalVariation, controlPeak]).toEqual([3 + 5 + 1, 3]);
  });

  it('what is not reached within the horizon is null', () => {
    const curve: Curve = (t) => [t / 10, 0.1];
    const m = setpointMetrics(trajectoryOf(curve, nothing, grid(5, 5)), { horizonS: 5, final: 1, points: 2 });
    expect([m.riseTimeS, m.settlingTimeS]).toEqual([null, null]);
    const away = setpointMetrics(trajectoryOf(curve, nothing, grid(5, 5)), {
      horizonS: 5,
      final: Infinity,
      points: 2,
    });
    expect(away.settlingTimeS).toBeNull();
  });

  it('a negative final value is approached from above', () => {
    const curve: Curve = (t) => [-2 * (1 - Math.exp(-t)), -2 * Math.exp(-t)];
    const m = setpointMetrics(trajectoryOf(curve, nothing, grid(12, 200)), {
      horizonS: 12,
      final: -2,
      points: 2,
    });
    expect(m.riseTimeS).toBeCloseTo(Math.log(9), 6);
    // max y = 0 at the start: 100·(0 + 2)/2.
    expect(m.overshootPct).toBeCloseTo(100, 12);
  });
});

describe('load figures', () => {
  it('t·e^(−t): peak 1/e at 1, the last exit from 2 % of it', () => {
    const curve: Curve = (t) => [t * Math.exp(-t), (1 - t) * Math.exp(-t)];
    const options = { horizonS: 20, final: 0, points: 3 };
    const m = loadMetrics(trajectoryOf(curve, nothing, grid(20, 501)), options);
    expect(m.peak).toBeCloseTo(1 / Math.E, 8);
    expect(m.peakTimeS).toBeCloseTo(1, 5);
    expect(m.iae).toBeCloseTo(1 - 21 * Math.exp(-20), 7);
    const t = m.recoveryTimeS ?? 0;
    expect(t * Math.exp(1 - t)).toBeCloseTo(0.02, 7);
    expect(t).toBeGreaterThan(1);
    const down = loadMetrics(
      trajectoryOf((s) => [-curve(s)[0], -curve(s)[1]], nothing, grid(20, 501)),
      options,
    );
    expect(down.peak).toBeCloseTo(-m.peak, 12);
  });

  it('creeping up to a final value has no peak time', () => {
    const curve: Curve = (t) => [1 - Math.exp(-t), Math.exp(-t)];
    const m = loadMetrics(trajectoryOf(curve, nothing, grid(30, 300)), { horizonS: 30, final: 1, points: 2 });
    expect(m.peakTimeS).toBeNull();
    expect(m.recoveryTimeS).toBeCloseTo(Math.log(50), 5);
  });

  it('a band left and entered within one piece counts', () => {
    // One cubic from 0 to 0 with a hump of 0.25 at its middle, then rest.
    const trajectory = new Trajectory();
    const hump = trajectory.add(1);
    [trajectory.dy0[hump], trajectory.dy1[hump]] = [1, -1];
    trajectory.add(2);
    expect(settledAfter(trajectory, 0, 0.36, 'peak')).toBeCloseTo(0.9, 12);
  });
});
