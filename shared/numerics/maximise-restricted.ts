import { NestedSummary, RestrictedLikelihood, restrictedLikelihood } from './restricted-likelihood';

export interface RestrictedEstimate extends RestrictedLikelihood {
  /** Residual first, then groups from the innermost level outwards. */
  readonly variances: readonly number[];
}

const MOST_STEPS = 200;
/** Newton's method squares the error: after a step of this share the next is below rounding. */
const LAST_STEP = 1e-9;

/**
 * Variances of the largest restricted likelihood, none below 0, the residual's above 0.
 * Newton's method with exact second derivatives, damped (Levenberg 1944) where the likelihood is not concave or a step would
 * lower it; a component at 0 stays there while the likelihood falls towards the inside.
 * @param start positive starting values, of the size of the solution
 */
export function maximiseRestricted(
  design: { readonly groups: readonly NestedSummary[] },
  start: readonly number[],
): RestrictedEstimate {
  let variances = start;
  let here = restrictedLikelihood(design, variances);
  let damping = 0;
  for (let step = 0; step < MOST_STEPS; step++) {
    const { slope, curve } = here.deviance;
    const free = variances.flatMap((variance, index) => (variance > 0 || slope[index] < 0 ? [index] : []));
    const move = dampedStep(slope, curve, free, damping);
    if (!move) {
      damping = Math.max(4 * damping, 1e-3);
      continue;
    }
    const next = variances.map((variance, index) => {
      const moved = variance + move[index];
      // The residual variance is a divisor: it may shrink, not vanish.
      return index === 0 ? Math.max(moved, variance / 10) : Math.max(0, moved);
    });
    const there = restrictedLikelihood(design, next);
    const size = next.reduce((sum, variance) => sum + variance, 0);
    const moved = Math.max(...next.map((variance, index) => Math.abs(variance - variances[index])));
    const isLast = moved <= LAST_STEP * size;
    if (!isLast && !(there.deviance.value <= here.deviance.value)) {
      damping = Math.max(4 * damping, 1e-3);
      continue;
    }
    variances = next;
    here = there;
    damping = damping < 1e-3 ? 0 : damping / 8;
    if (isLast && damping === 0) break;
  }
  return { ...here, variances };
}

/** −(H + damping · |diagonal|)⁻¹ · slope over the free parameters, 0 elsewhere; null when the matrix is not positive definite. */
function dampedStep(
  slope: readonly number[],
  curve: readonly number[],
  free: readonly number[],
  damping: number,
): readonly number[] | null {
  const n = slope.length;
  const size = free.length;
  // Cholesky: lower[i][j] for j ≤ i.
  const lower: number[][] = [];
  for (let i = 0; i < size; i++) {
    const row: number[] = [];
    for (let j = 0; j <= i; j++) {
      let sum = curve[free[i] * n + free[j]];
      if (i === j) sum += damping * Math.abs(sum);
      for (let k = 0; k < j; k++) sum -= row[k] * (i === j ? row[k] : lower[j][k]);
      if (i === j && !(sum > 0)) return null;
      row.push(i === j ? Math.sqrt(sum) : sum / lower[j][j]);
    }
    lower.push(row);
  }
  const solution = free.map((index) => -slope[index]);
  for (let i = 0; i < size; i++) {
    for (let k = 0; k < i; k++) solution[i] -= lower[i][k] * solution[k];
    solution[i] /= lower[i][i];
  }
  for (let i = size - 1; i >= 0; i--) {
    for (let k = i + 1; k < size; k++) solution[i] -= lower[k][i] * solution[k];
    solution[i] /= lower[i][i];
  }
  const move = new Array<number>(n).fill(0);
  free.forEach((index, at) => (move[index] = solution[at]));
  return move;
}
