export interface Quadrature {
  readonly nodes: readonly number[];
  readonly weights: readonly number[];
}

const made = new Map<number, Quadrature>();

/**
 * Nodes and weights of the n-point Gauss–Legendre rule on [−1, 1], by Newton's method on the Legendre polynomial
 * from Tricomi's first guess. Exact to rounding; the same rule is made once.
 */
export function gaussLegendre(n: number): Quadrature {
  const known = made.get(n);
  if (known) return known;
  const nodes = new Array<number>(n);
  const weights = new Array<number>(n);
  for (let i = 0; i < Math.ceil(n / 2); i++) {
    let x = Math.cos((Math.PI * (i + 0.75)) / (n + 0.5));
    let slope = 0;
    for (let step = 0; step < 100; step++) {
      let before = 1;
      let here = x;
      for (let k = 2; k <= n; k++) [before, here] = [here, ((2 * k - 1) * x * here - (k - 1) * before) / k];
      if (n === 1) before = 1;
      slope = (n * (x * here - before)) / (x * x - 1);
      const move = here / slope;
      x -= move;
      if (Math.abs(move) < 1e-16) break;
    }
    nodes[i] = -x;
    nodes[n - 1 - i] = x;
    weights[i] = weights[n - 1 - i] = 2 / ((1 - x * x) * slope * slope);
  }
  const rule = { nodes, weights };
  made.set(n, rule);
  return rule;
}
