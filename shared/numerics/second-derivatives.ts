/**
 * Numbers that carry their first and second derivatives along, so that a formula is written once and its derivatives are
 * right by construction (forward differentiation, exact up to rounding).
 */
export interface Jet {
  readonly value: number;
  /** First derivatives by each parameter. */
  readonly slope: readonly number[];
  /** Second derivatives, row by row. */
  readonly curve: readonly number[];
}

export const constant = (value: number, parameters: number): Jet => ({
  value,
  slope: new Array<number>(parameters).fill(0),
  curve: new Array<number>(parameters * parameters).fill(0),
});

export const parameter = (value: number, index: number, parameters: number): Jet => ({
  ...constant(value, parameters),
  slope: Array.from({ length: parameters }, (_, at) => (at === index ? 1 : 0)),
});

/** `a` + `factor` · `b`. */
export const add = (a: Jet, b: Jet, factor = 1): Jet => ({
  value: a.value + factor * b.value,
  slope: a.slope.map((each, i) => each + factor * b.slope[i]),
  curve: a.curve.map((each, i) => each + factor * b.curve[i]),
});

export const times = (a: Jet, b: Jet): Jet => {
  const n = a.slope.length;
  return {
    value: a.value * b.value,
    slope: a.slope.map((each, i) => each * b.value + a.value * b.slope[i]),
    curve: a.curve.map((each, at) => {
      const i = Math.floor(at / n);
      const j = at % n;
      return each * b.value + a.value * b.curve[at] + (a.slope[i] * b.slope[j] + a.slope[j] * b.slope[i]);
    }),
  };
};

/** A function of `a`, given its value and two derivatives there. */
const chain = (a: Jet, value: number, first: number, second: number): Jet => {
  const n = a.slope.length;
  return {
    value,
    slope: a.slope.map((each) => first * each),
    curve: a.curve.map((each, at) => first * each + second * a.slope[Math.floor(at / n)] * a.slope[at % n]),
  };
};

export const reciprocal = (a: Jet): Jet => {
  const inverse = 1 / a.value;
  return chain(a, inverse, -inverse * inverse, 2 * inverse ** 3);
};

export const logarithm = (a: Jet): Jet => {
  const inverse = 1 / a.value;
  return chain(a, Math.log(a.value), inverse, -inverse * inverse);
};
