import type { Trajectory } from '../metrics';

/** Ends a trajectory that covers the horizon there; the cubics of its last piece are cut. */
export function cutAt(trajectory: Trajectory, horizonS: number): Trajectory {
  const { t } = trajectory;
  while (trajectory.count > 1 && t[trajectory.count - 1] >= horizonS * (1 - 1e-12)) trajectory.count -= 1;
  const last = trajectory.count - 1;
  const h = t[last + 1] - t[last];
  const x = (horizonS - t[last]) / h;
  t[last + 1] = horizonS;
  if (Math.abs(x - 1) < 1e-12) return trajectory;
  const cut = (v0: Float64Array, d0: Float64Array, v1: Float64Array, d1: Float64Array) => {
    const a = v0[last];
    const b = h * d0[last];
    const c = 3 * (v1[last] - a) - 2 * b - h * d1[last];
    const d = 2 * (a - v1[last]) + b + h * d1[last];
    v1[last] = a + x * (b + x * (c + x * d));
    d1[last] = (b + x * (2 * c + 3 * x * d)) / h;
  };
  cut(trajectory.y0, trajectory.dy0, trajectory.y1, trajectory.dy1);
  cut(trajectory.u0, trajectory.du0, trajectory.u1, trajectory.du1);
  return trajectory;
}
