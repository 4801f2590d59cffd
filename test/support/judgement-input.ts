import { JudgedCooler, JudgedRun, JudgementInput } from '../../shared/contracts/judgement';

/** A run of which only the value is known; fields can be set where a test needs them. */
export const judgedRun = (value: number, fields: Partial<JudgedRun> = {}): JudgedRun => ({
  name: '1',
  value,
  order: null,
  ambient: null,
  ambientRange: null,
  watts: null,
  fanSpeed: null,
  settled: 'no trace',
  windowSetByHand: false,
  sensorStep: null,
  withinStandardDeviation: null,
  digest: null,
  ...fields,
});

/** A cooler with one list of values a mount. */
export const remountedCooler = (name: string, mounts: readonly (readonly number[])[]): JudgedCooler => ({
  name,
  mountsRecorded: true,
  mounts: mounts.map((values, mount) => ({
    name: String(mount + 1),
    runs: values.map((value, run) => judgedRun(value, { name: String(run + 1) })),
  })),
});

/** A cooler whose mounts were not recorded. */
export const plainCooler = (name: string, values: readonly number[]): JudgedCooler => ({
  name,
  mountsRecorded: false,
  mounts: [{ name: '', runs: values.map((value, run) => judgedRun(value, { name: String(run + 1) })) }],
});

export const judgementInput = (
  coolers: JudgedCooler[],
  fields: Partial<JudgementInput> = {},
): JudgementInput => ({
  metric: 'rise',
  thresholds: { confidence: 0.95, power: 0.8, gapThatMatters: 1 },
  bench: null,
  nominalWatts: null,
  seed: 1,
  coolers,
  leftOut: [],
  ...fields,
});
