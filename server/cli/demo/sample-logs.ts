import type { DemoLog, Scenario } from './demo-logs';
import { logsOf } from './demo-logs';

/** A comparison for somebody new to drop in by hand: two coolers of one load, well apart. */
export const SAMPLE: Scenario = {
  seed: 10,
  coolers: ['Tall fins', 'Short fins'],
  conditions: [
    {
      name: 'Stock load',
      nominalWatts: 120,
      toAir: { 'Tall fins': 0.148, 'Short fins': 0.158 },
      fanSpeed: 1100,
    },
  ],
  contact: 0.082,
  mountSpread: 0.0015,
  runSpread: 0.0006,
  plan: [
    { cooler: 1, mount: 1, runs: 4, writing: 'plain', step: 1 },
    { cooler: 0, mount: 1, runs: 4, writing: 'plain', step: 1 },
    { cooler: 0, mount: 2, runs: 3, writing: 'spreadsheet', step: 2 },
    { cooler: 1, mount: 2, runs: 3, writing: 'lab recorder', step: 2 },
    { cooler: 1, mount: 3, runs: 3, writing: 'data logger', step: 1 },
    { cooler: 0, mount: 3, runs: 3, writing: 'lab recorder', step: 1 },
  ],
  // Monday 18 May 2026, 09:30: no day of it can be taken for a month.
  start: { day: 20591, second: 34200 },
};

const decode = (bytes: Uint8Array): string => new TextDecoder('utf-8').decode(bytes);

/** Small faults of real logs, so that a first drop shows how they are met; none of them hurts the verdict. */
const FAULTS: Readonly<Record<string, (lines: string[]) => string[]>> = {
  // A logger that was off for 47 s, well before the steady window.
  'short-fins_m1_r2.csv': (lines) => lines.filter((_, i) => i < 191 || i > 237),
  // A program that was stopped in the middle of a line.
  'tall-fins_m1_r3.csv': (lines) => [...lines.slice(0, -2), lines[lines.length - 2].slice(0, 9)],
  // A sensor read twice in vain.
  'tall-fins_m1_r4.csv': (lines) =>
    lines.map((line, i) => (i === 701 || i === 702 ? line.replace(/^(\d+),[^,]+/, '$1,err') : line)),
};

/** Twenty logs, two coolers of ten runs each over three mounts; the same bytes every time. */
export function sampleLogs(): DemoLog[] {
  return logsOf(SAMPLE).map((log) => {
    const fault = FAULTS[log.fileName];
    return fault
      ? { ...log, bytes: new TextEncoder().encode(fault(decode(log.bytes).split('\n')).join('\n')) }
      : log;
  });
}
