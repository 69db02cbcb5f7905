import type { Responses } from './exact';

/** Largest difference of two curves on the same grid, as a share of the larger one's peak. */
function curveDifference(a: Float64Array, b: Float64Array): number {
  let difference = 0;
  let peak = 0;
  for (let i = 0; i < a.length; i += 1) {
    peak = Math.max(peak, Math.abs(a[i]), Math.abs(b[i]));
    const here = Math.abs(a[i] - b[i]);
    // A point on a jump may fall on either side of it in the two engines: its neighbours tell the same.
    const before = i > 0 ? Math.abs(a[i - 1] - b[i]) : here;
    const after = i < a.length - 1 ? Math.abs(a[i + 1] - b[i]) : here;
    difference = Math.max(difference, Math.min(here, Math.max(before, after)));
  }
  return peak > 0 ? difference / peak : 0;
}

/** Largest difference of y between two engines on the same grid, as a share of the peak; the worse of both responses. */
export function agreementOf(a: Responses, b: Responses): number {
  return Math.max(curveDifference(a.setpoint.y, b.setpoint.y), curveDifference(a.load.y, b.load.y));
}
