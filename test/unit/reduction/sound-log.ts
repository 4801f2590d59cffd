import type { ColumnMap } from '../../../shared/contracts';
import { Random } from './random';

export const utf8 = (text: string): Uint8Array => new TextEncoder().encode(text);

/** Rows of a sound log; `change` alters the cells of one row, or answers the whole line. */
export function sound(
  change: (cells: string[], i: number) => string[] | string = (cells) => cells,
  rows = 1300,
): string[] {
  return Array.from({ length: rows }, (_, i) => {
    const cells = [
      String(i),
      (62 + (i % 3) / 10).toFixed(1),
      (22 + (i % 2) / 10).toFixed(1),
      '180.0',
      '1200',
    ];
    const changed = change(cells, i);
    return typeof changed === 'string' ? changed : changed.join(',');
  });
}
export const HEADER = 'time_s,plate_c,ambient_c,watts,fan_rpm';
export const logOf = (lines: readonly string[], header = HEADER): Uint8Array =>
  utf8([header, ...lines].join('\n') + '\n');
export const noise = (n: number): Uint8Array => {
  const r = new Random(7);
  return Uint8Array.from({ length: n }, () => r.whole(0, 255));
};
export const starting = (...bytes: number[]): Uint8Array => Uint8Array.from([...bytes, ...noise(3000)]);
export const map = (time: number, heatSource: number, ambient: number | null): ColumnMap => ({
  time,
  heatSource,
  ambient,
  watts: null,
  fanSpeed: null,
});
