/**
 * Smallest step between two different readings of a sensor, °C, or null when it never changed.
 * A sensor of whole degrees gives 1, one of tenths 0.1; a finely resolved one gives a step too small to matter.
 */
export function smallestStep(values: Float64Array): number | null {
  const sorted = Float64Array.from(values.filter((value) => !Number.isNaN(value))).sort();
  let smallest = Infinity;
  for (let i = 1; i < sorted.length; i += 1) {
    const step = sorted[i] - sorted[i - 1];
    // Steps below 1e-9 are the rounding of binary fractions, not of a sensor.
    if (step > 1e-9 && step < smallest) smallest = step;
  }
  if (smallest === Infinity) return null;
  return Math.round(smallest * 1e9) / 1e9;
}
