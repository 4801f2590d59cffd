/**
 * Spreads readings that share a time stamp: a clock written to the minute, or to the second by a faster logger, gives
 * many readings the same time. Inside each stamp they are taken to be even.
 * @returns null when most readings have a stamp of their own
 */
export function spreadStamps(seconds: Float64Array): Float64Array | null {
  const starts: number[] = [];
  for (let i = 0; i < seconds.length; i += 1) if (i === 0 || seconds[i] > seconds[i - 1]) starts.push(i);
  const shared = seconds.length - starts.length;
  if (starts.length < 3 || shared <= seconds.length / 2) return null;
  const end = (k: number): number => starts[k + 1] ?? seconds.length;
  const steps: number[] = [];
  const sizes: number[] = [];
  for (let k = 1; k + 1 < starts.length; k += 1) {
    steps.push(seconds[starts[k + 1]] - seconds[starts[k]]);
    sizes.push(end(k) - starts[k]);
  }
  const middle = (values: number[]): number =>
    [...values].sort((a, b) => a - b)[Math.floor(values.length / 2)];
  const usualStep = middle(steps);
  const usualPace = usualStep / middle(sizes);
  const spread = Float64Array.from(seconds);
  for (let k = 0; k < starts.length; k += 1) {
    const size = end(k) - starts[k];
    const next = seconds[end(k)];
    // The first stamp may have begun before the log, the last may go on after it, and a hole belongs to no reading.
    const whole = k > 0 && next !== undefined && next - seconds[starts[k]] <= 1.5 * usualStep;
    for (let i = 0; i < size; i += 1) {
      const at = starts[k] + i;
      if (k === 0 && next !== undefined)
        spread[at] = next - Math.min((size - i) * usualPace, next - seconds[at]);
      else
        spread[at] =
          seconds[at] + i * (whole ? (next - seconds[at]) / size : Math.min(usualPace, usualStep / size));
    }
  }
  return spread;
}
