/**
 * Least value of a function of a few variables without derivatives.
 *
 * @param start first corner of the simplex; the others lie `size` away along each axis
 * @returns the best point found when the simplex has shrunk to 1e-9 of its size, or after 2,000 evaluations
 * Source: Nelder & Mead, A simplex method for function minimization, Computer Journal 7 (1965) 308-313.
 */
export function nelderMead(
  cost: (point: readonly number[]) => number,
  start: readonly number[],
  size: number,
): { readonly point: number[]; readonly value: number } {
  let evaluations = 0;
  const corner = (point: number[]) => {
    evaluations += 1;
    return { point, value: cost(point) };
  };
  const simplex = [corner(start.slice())];
  start.forEach((_, i) => simplex.push(corner(start.map((x, j) => (i === j ? x + size : x)))));
  while (evaluations < 2000) {
    simplex.sort((p, q) => p.value - q.value);
    const worst = simplex[simplex.length - 1];
    const best = simplex[0];
    const spread = Math.max(...worst.point.map((x, i) => Math.abs(x - best.point[i])));
    if (spread <= 1e-9 * size) break;
    const others = simplex.slice(0, -1);
    const centre = start.map((_, i) => others.reduce((sum, c) => sum + c.point[i], 0) / others.length);
    const along = (factor: number) => corner(centre.map((x, i) => x + factor * (worst.point[i] - x)));
    const reflected = along(-1);
    if (reflected.value < best.value) {
      const expanded = along(-2);
      simplex[simplex.length - 1] = expanded.value < reflected.value ? expanded : reflected;
    } else if (reflected.value < others[others.length - 1].value) {
      simplex[simplex.length - 1] = reflected;
    } else {
      const contracted = along(reflected.value < worst.value ? -0.5 : 0.5);
      if (contracted.value < Math.min(worst.value, reflected.value)) simplex[simplex.length - 1] = contracted;
      else {
        for (let i = 1; i < simplex.length; i += 1) {
          simplex[i] = corner(simplex[i].point.map((x, j) => (x + best.point[j]) / 2));
        }
      }
    }
  }
  simplex.sort((p, q) => p.value - q.value);
  return simplex[0];
}
