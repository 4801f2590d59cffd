import { JudgedRun, PairResult, Verdict, VerdictRow } from '../../../shared/contracts';

/** The invented fin pair of the design as a whole verdict, for component specs. */

const BARE = [
  [42.56, 42.38],
  [41.56, 41.68],
  [42.23, 42.01],
  [41.46, 41.36],
  [41.99, 42.15],
];
const COATED = [
  [41.24, 41.1],
  [41.69, 41.89],
  [40.8, 40.7],
  [41.72, 41.48],
  [41.19, 41.31],
];

export const id = (number: number): string => `00000000-0000-4000-8000-${String(number).padStart(12, '0')}`;
const digest = (seed: number): string =>
  Array.from({ length: 64 }, (_, i) => ((seed * 7 + i * 5 + ((i * i) % 11)) % 16).toString(16)).join('');

function run(value: number, name: string, order: number): JudgedRun {
  return {
    name,
    value,
    order,
    ambient: 22.4,
    ambientRange: 0.2,
    watts: 180.1,
    fanSpeed: 1200,
    settled: 'settled',
    windowSetByHand: false,
    sensorStep: 0.01,
    withinStandardDeviation: 0.05,
    digest: digest(order),
  };
}

const cooler = (name: string, values: number[][], offset: number) => ({
  name,
  mountsRecorded: true,
  mounts: values.map((runs, mount) => ({
    name: String(mount + 1),
    runs: runs.map((value, index) => run(value, String(index + 1), 4 * mount + 2 * index + 1 + offset)),
  })),
});
const mountMeans = (values: number[][]) =>
  values.map((runs, mount) => ({
    name: String(mount + 1),
    mean: runs.reduce((sum, value) => sum + value, 0) / runs.length,
    runs: runs.length,
  }));

export const FIN_PAIR_RESULT: PairResult = {
  a: 'Coated fins',
  b: 'Bare fins',
  gap: -0.6259999999999977,
  standardError: 0.2614,
  degreesOfFreedom: 7.98,
  statistic: -2.395,
  confidence: 0.95,
  interval: [-1.2287, -0.0233],
  marginOfError: 0.6027,
  p: 0.0435,
  clearance: 1.0387,
  smallestVisibleGap: 0.8312,
  powerAtGapThatMatters: 0.39,
  equivalence: { p: 0.68, interval: [-1.112, -0.14], confidence: 0.9 },
  gapThatMatters: 0.5,
  flag: 'outside noise',
  sizeCall: 'size open',
  scope: 'mounts',
  unitOfEvidence: 'mount',
  tippingMountSpread: null,
  naive: { gap: -0.626, standardError: 0.176, degreesOfFreedom: 17.9, p: 0.0023, marginOfError: 0.3698 },
  notJudged: null,
  more: [
    { mounts: 5, runs: 10, marginOfError: 0.6027, clearance: 1.0387 },
    { mounts: 7, runs: 14, marginOfError: 0.4821, clearance: 1.2985 },
    { mounts: 10, runs: 20, marginOfError: 0.3889, clearance: 1.6097 },
    { mounts: 14, runs: 28, marginOfError: 0.3212, clearance: 1.949 },
  ],
  leaveOneOut: {
    unit: 'mount',
    units: 10,
    tips: 6,
    which: [1, 3, 5].flatMap((mount) => [`Coated fins, mount ${mount}`, `Bare fins, mount ${mount}`]),
  },
};

const ROW: VerdictRow = {
  id: id(1),
  study: { id: id(2), name: 'Fin coating, twin-tower pair' },
  condition: { id: id(3), name: '180 W on the test head', nominalWatts: 180 },
  metric: 'rise',
  unit: '°C',
  state: 'submitted',
  stateSince: '2026-03-12T09:41:00.000Z',
  preparedBy: 'Analyst 2',
  judgedAt: '2026-03-12T09:30:00.000Z',
  thresholdsNumber: 7,
  method: 'welch-mounts/1',
  pairs: [
    {
      a: 'Coated fins',
      b: 'Bare fins',
      gap: FIN_PAIR_RESULT.gap,
      marginOfError: FIN_PAIR_RESULT.marginOfError,
      clearance: FIN_PAIR_RESULT.clearance,
      gapThatMatters: 0.5,
      flag: 'outside noise',
      sizeCall: 'size open',
      notJudgedCode: null,
      headline: 'Outside noise, only just',
    },
  ],
  cautions: 2,
  stops: 0,
  stale: false,
  lastReRun: null,
};

export function finRow(changes: Partial<VerdictRow> = {}): VerdictRow {
  return { ...ROW, ...changes };
}

export function finVerdict(changes: Partial<Verdict> = {}): Verdict {
  return {
    ...ROW,
    bench: { id: id(4), name: 'Bench 2, north room' },
    question: 'Does the coating pay?',
    input: {
      metric: 'rise',
      thresholds: { confidence: 0.95, power: 0.8, gapThatMatters: 0.5 },
      bench: { mountSpread: 0.41, mountSpreadDegreesOfFreedom: 40 },
      nominalWatts: 180,
      seed: 1,
      coolers: [cooler('Coated fins', COATED, 0), cooler('Bare fins', BARE, 1)],
      leftOut: [],
    },
    judgement: {
      method: 'welch-mounts/1',
      engine: '1.0.0',
      unit: '°C',
      coolers: [
        {
          name: 'Coated fins',
          runs: 10,
          mounts: 5,
          mean: 41.312,
          standardDeviation: 0.4045,
          units: 5,
          standardError: 0.1809,
          interval: [40.81, 41.814],
          spreadBetweenRuns: 0.1239,
          spreadBetweenMounts: 0.3948,
          spreadBetweenMountsTruncated: false,
          mountMeans: mountMeans(COATED),
        },
        {
          name: 'Bare fins',
          runs: 10,
          mounts: 5,
          mean: 41.938,
          standardDeviation: 0.4218,
          units: 5,
          standardError: 0.1887,
          interval: [41.414, 42.462],
          spreadBetweenRuns: 0.1118,
          spreadBetweenMounts: 0.4143,
          spreadBetweenMountsTruncated: false,
          mountMeans: mountMeans(BARE),
        },
      ],
      pairs: [FIN_PAIR_RESULT],
      words: [
        {
          headline: 'Outside noise, only just',
          ratio: '1.04× the margin of error',
          secondLine:
            'Coated fins ran 0.63\u00a0°C lower than Bare fins. The margin of error is ±0.60\u00a0°C. Whether the gap reaches 0.50\u00a0°C is open.',
          quote:
            'At 180\u00a0W Coated fins averaged 41.31\u00a0°C over ambient and Bare fins 41.94\u00a0°C: a gap of 0.63\u00a0°C, give or take 0.60\u00a0°C at 95% confidence, from ten runs over five mounts each. That is only just outside the bench’s noise.',
          doesNotCover: [
            'Other units of the same models: one of each was tested.',
            'Other loads, fan settings or rooms than the ones measured.',
          ],
        },
      ],
      findings: [
        {
          code: 'mounts',
          level: 'note',
          title: 'Mounts',
          text: 'Remounting moves a reading 0.41\u00a0°C; repeating it moves 0.12\u00a0°C. Noise is counted per mount, not per run.',
          numbers: {},
        },
        {
          code: 'outlying-runs',
          level: 'caution',
          title: 'Outlying runs',
          text: 'No run stands apart from its mount. But leaving out any one of 6 of the 10 mounts brings the gap back inside the noise band.',
          numbers: {},
        },
        {
          code: 'drift',
          level: 'note',
          title: 'Drift',
          text: 'In test order, readings rose 0.03\u00a0°C over the session, alike for both coolers.',
          numbers: {},
        },
        {
          code: 'visible-gap',
          level: 'caution',
          title: 'Detectable gap',
          text: 'Five mounts each find a gap of 0.83\u00a0°C four times in five. A true gap of 0.50\u00a0°C would usually be missed.',
          numbers: {},
        },
        {
          code: 'order',
          level: 'note',
          title: 'Order',
          text: 'Coolers alternated mount by mount, so a slow change in the room can’t pass for a gap.',
          numbers: {},
        },
        {
          code: 'heat-load',
          level: 'note',
          title: 'Heat load',
          text: 'Load held at 180.0 ± 0.4\u00a0W. 0.4\u00a0W is worth 0.09\u00a0°C, alike for both coolers.',
          numbers: {},
        },
      ],
    },
    thresholds: {
      number: 7,
      values: { confidence: 0.95, power: 0.8, gapThatMatters: 0.5 },
      inForceSince: '2026-02-03T08:00:00.000Z',
      latestNumber: 7,
    },
    dataDigest: digest(3),
    logs: Array.from({ length: 20 }, (_, i) => ({
      runId: id(100 + i),
      fileName: `${i < 10 ? 'C' : 'B'}${Math.floor((i % 10) / 2) + 1}-run${(i % 2) + 1}.csv`,
      digest: digest(i + 1),
    })),
    staleReasons: [],
    steps: [
      { action: 'judged', by: 'Analyst 2', role: 'analyst', at: '2026-03-12T09:30:00.000Z', comment: null },
      {
        action: 'submitted',
        by: 'Analyst 2',
        role: 'analyst',
        at: '2026-03-12T09:41:00.000Z',
        comment: 'Both coolers on one afternoon, door shut.',
      },
    ],
    may: { submit: false, signOff: true, sendBack: true, withdraw: false, reRun: true },
    mayNot: { submit: 'Only an analyst submits.', withdraw: 'Only a signed-off verdict can be withdrawn.' },
    ...changes,
  };
}
