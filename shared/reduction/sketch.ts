import { TraceSketch } from '../contracts/run-summary';
import { Rise } from './rise';

const MOST_POINTS = 400;

/**
 * Thins a trace for drawing to at most 400 points, keeping its shape by the lowest and highest reading of each stretch
 * in the order they came, and its holes by a point without a value.
 * @param hole readings further apart than this, s, are not joined by a line
 */
export function sketchOf(trace: Rise, hole: number): TraceSketch {
  const { seconds, rise, ambient } = trace;
  const sketch: TraceSketch = { seconds: [], rise: [], ambient: [] };
  const n = seconds.length;
  if (n === 0) return sketch;
  const holes: number[] = [];
  for (let i = 1; i < n; i += 1) if (seconds[i] - seconds[i - 1] > hole) holes.push(i);
  // Very many holes would use up the points; then only the widest are drawn.
  const widest = holes
    .sort((a, b) => seconds[b] - seconds[b - 1] - (seconds[a] - seconds[a - 1]))
    .slice(0, 60)
    .sort((a, b) => a - b);
  const room = MOST_POINTS - widest.length;
  const point = (i: number) => {
    sketch.seconds.push(round(seconds[i]));
    sketch.rise.push(round(rise[i]));
    sketch.ambient.push(round(ambient[i]));
  };
  const stretches = Math.max(1, Math.floor(room / 2) - widest.length - 1);
  const size = Math.max(1, Math.ceil(n / stretches));
  const starts = [0, ...widest];
  starts.forEach((start, k) => {
    if (k > 0) {
      sketch.seconds.push(round((seconds[start - 1] + seconds[start]) / 2));
      sketch.rise.push(null);
      sketch.ambient.push(null);
    }
    const end = starts[k + 1] ?? n;
    for (let from = start; from < end; from += size) {
      const to = Math.min(from + size, end);
      let lowest = from;
      let highest = from;
      for (let i = from; i < to; i += 1) {
        if (rise[i] < rise[lowest]) lowest = i;
        if (rise[i] > rise[highest]) highest = i;
      }
      point(Math.min(lowest, highest));
      if (lowest !== highest) point(Math.max(lowest, highest));
    }
  });
  return sketch;
}

/** Four decimals are finer than any screen and halve the stored size. */
const round = (value: number): number => Math.round(value * 1e4) / 1e4;
