import { simulate } from './bench-model';
import type { Chance } from './chance';
import { chanceFrom } from './chance';
import type { Moment, Writing } from './log-writer';
import { isoOf, writeLog } from './log-writer';

/** A log of the demo, with what a tester knows of it beside its bytes. */
export interface DemoLog {
  readonly fileName: string;
  readonly bytes: Uint8Array;
  readonly cooler: string;
  readonly condition: string;
  readonly mount: string;
  readonly run: string;
  /** Place in the order of testing over the whole study, from 1. */
  readonly order: number;
  /** ISO 8601 without offset, as the bench's clock showed it. */
  readonly startedAt: string;
}

export interface DemoCondition {
  readonly name: string;
  readonly nominalWatts: number;
  /** K/W, cooler to air, by cooler: the truth that the logs hide under noise. */
  readonly toAir: Readonly<Record<string, number>>;
  readonly fanSpeed: number;
}

/** One comparison of two coolers: who, under what, how noisy, in which order. */
export interface Scenario {
  readonly seed: number;
  /** Compared cooler first, reference last. */
  readonly coolers: readonly [string, string];
  readonly conditions: readonly DemoCondition[];
  /** K/W of contact, and the standard deviations by which a mount and a run change it. */
  readonly contact: number;
  readonly mountSpread: number;
  readonly runSpread: number;
  /** Mounts in the order of testing: cooler by place, its mount, its runs under each condition, its logger. */
  readonly plan: readonly {
    readonly cooler: 0 | 1;
    readonly mount: number;
    readonly runs: number;
    readonly writing: Writing;
    readonly step: number;
  }[];
  /** Day and second of the first run. */
  readonly start: Moment;
}

/** s between the starts of two runs: half an hour of log, the rest to cool down. */
const RUN_PERIOD = 3300;
const DURATION = 1800;

/** A truth told by invention: the coating gains nothing at the stock load and a little, about 0.7 °C, at the raised one. */
export const DEMO: Scenario = {
  seed: 64,
  coolers: ['Coated fins', 'Bare fins'],
  conditions: [
    {
      name: 'Stock load',
      nominalWatts: 120,
      toAir: { 'Coated fins': 0.15, 'Bare fins': 0.15 },
      fanSpeed: 1200,
    },
    {
      name: 'Raised load',
      nominalWatts: 180,
      toAir: { 'Coated fins': 0.1461, 'Bare fins': 0.15 },
      fanSpeed: 1200,
    },
  ],
  contact: 0.082,
  mountSpread: 0.0012,
  runSpread: 0.0005,
  // Order ABBA AB: neither cooler has the later days to itself.
  plan: [
    { cooler: 1, mount: 1, runs: 4, writing: 'plain', step: 1 },
    { cooler: 0, mount: 1, runs: 4, writing: 'plain', step: 1 },
    { cooler: 0, mount: 2, runs: 3, writing: 'lab recorder', step: 2 },
    { cooler: 1, mount: 2, runs: 3, writing: 'lab recorder', step: 2 },
    { cooler: 1, mount: 3, runs: 3, writing: 'data logger', step: 1 },
    { cooler: 0, mount: 3, runs: 3, writing: 'spreadsheet', step: 1 },
  ],
  // Monday 9 March 2026, 17:00: the last run of each evening passes midnight.
  start: { day: 20521, second: 61200 },
};

const fileWord = (name: string): string => name.toLowerCase().replace(/ /g, '-');

/** Slow course of the room over the days, °C. */
const roomAt = (chance: Chance): number => 22.4 + 0.5 * chance.normal();

/** All logs of a scenario in the order of testing; the same bytes for the same scenario. */
export function logsOf(scenario: Scenario): DemoLog[] {
  const chance = chanceFrom(scenario.seed);
  const logs: DemoLog[] = [];
  scenario.plan.forEach((sitting, evening) => {
    const cooler = scenario.coolers[sitting.cooler];
    const contactOfMount = scenario.contact + scenario.mountSpread * chance.normal();
    const room = roomAt(chance);
    for (let run = 1; run <= sitting.runs; run += 1) {
      for (const condition of scenario.conditions) {
        const order = logs.length + 1;
        const place = (run - 1) * scenario.conditions.length + scenario.conditions.indexOf(condition);
        const seconds = scenario.start.second + place * RUN_PERIOD + Math.floor(chance.uniform() * 240);
        const start = {
          day: scenario.start.day + evening + Math.floor(seconds / 86400),
          second: seconds % 86400,
        };
        const readings = simulate(
          {
            watts: condition.nominalWatts * (1 + 0.0015 * chance.normal()),
            contact: contactOfMount + scenario.runSpread * chance.normal(),
            toAir: condition.toAir[cooler],
            plateCapacity: 150,
            coolerCapacity: 620,
            room: room - 0.08 * place + 0.1 * chance.normal(),
            roomDrift: 0.2 * chance.normal(),
            headStart: 0.8 + 0.8 * chance.uniform(),
            fanSpeed: condition.fanSpeed,
            duration: DURATION,
            step: sitting.step,
            sensorNoise: 0.12,
            sensorStep: 0.1,
          },
          chance,
        );
        logs.push({
          fileName: `${[fileWord(cooler), ...(scenario.conditions.length > 1 ? [fileWord(condition.name).replace(/-load$/, '')] : []), `m${sitting.mount}`, `r${run}`].join('_')}.csv`,
          bytes: writeLog(sitting.writing, readings, start, 1),
          cooler,
          condition: condition.name,
          mount: String(sitting.mount),
          run: String(run),
          order,
          startedAt: isoOf(start),
        });
      }
    }
  });
  return logs;
}

/** The demo study's forty logs: two coolers, two loads, ten runs each over three mounts. */
export const demoLogs = (): DemoLog[] => logsOf(DEMO);
