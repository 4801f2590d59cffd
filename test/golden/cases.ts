import { JudgedCooler, JudgedRun, JudgementInput } from '../../shared/contracts/judgement';
import { judgedRun, judgementInput, plainCooler, remountedCooler } from '../support/judgement-input';

/** Invented readings, °C: five mounts of two runs each. */
const BARE = [
  [49.1, 49.3],
  [48.6, 48.8],
  [49.4, 49.0],
  [48.9, 48.7],
  [49.6, 49.2],
];
const COATED = [
  [48.3, 48.1],
  [48.8, 48.4],
  [47.9, 48.2],
  [48.5, 48.7],
  [47.8, 48.0],
];

/** Gives every run of a cooler more than its value. */
const withFields = (cooler: JudgedCooler, fieldsOf: (index: number) => Partial<JudgedRun>): JudgedCooler => {
  let index = 0;
  return {
    ...cooler,
    mounts: cooler.mounts.map((mount) => ({
      ...mount,
      runs: mount.runs.map((run) => ({ ...run, ...fieldsOf(index++) })),
    })),
  };
};

const logged = (watts: number, ambient: number, first: number) => (index: number) =>
  ({
    order: 2 * index + first,
    watts: watts + 0.1 * (index % 3),
    ambient: ambient + 0.05 * (index % 4),
    ambientRange: 0.3,
    fanSpeed: 1200 + 2 * (index % 5),
    settled: 'settled',
    sensorStep: 0.1,
    withinStandardDeviation: 0.12,
  }) satisfies Partial<JudgedRun>;

const coated = remountedCooler('Coated fins', COATED);
const bare = remountedCooler('Bare fins', BARE);

/** Inputs that between them take every branch of the arithmetic. The seed and names stay: they are part of the files. */
export const GOLDEN_CASES: Readonly<Record<string, JudgementInput>> = {
  'mounts-logged': judgementInput(
    [withFields(coated, logged(180, 22, 1)), withFields(bare, logged(180.2, 22.2, 2))],
    { nominalWatts: 180 },
  ),
  'mounts-only-values': judgementInput([coated, bare]),
  'mounts-resistance': judgementInput(
    [
      withFields(remountedCooler('Coated fins', scaled(COATED)), logged(180, 22, 1)),
      withFields(remountedCooler('Bare fins', scaled(BARE)), logged(180.2, 22.2, 2)),
    ],
    { metric: 'resistance', nominalWatts: 180 },
  ),
  'mounts-unbalanced': judgementInput([
    remountedCooler('A', [[40.1], [40.6, 40.4, 40.5], [39.9, 40.2, 40.0, 40.1, 39.8]]),
    remountedCooler('B', [
      [41.1, 41.3],
      [40.7, 40.9, 40.8],
    ]),
  ]),
  'mounts-blocked-order': judgementInput([
    withFields(coated, (index) => ({ order: index + 1 })),
    withFields(bare, (index) => ({ order: index + 11 })),
  ]),
  'mounts-strict-thresholds': judgementInput([coated, bare], {
    thresholds: { confidence: 0.99, power: 0.9, gapThatMatters: 0.5 },
  }),
  'mounts-run-left-out': judgementInput([coated, bare], {
    leftOut: [
      {
        cooler: 'Coated fins',
        mount: '1',
        run: judgedRun(52.4, { name: '3' }),
        reason: 'The fan cable was loose.',
      },
    ],
  }),
  'runs-not-recorded': judgementInput([
    plainCooler('Coated fins', COATED.flat()),
    plainCooler('Bare fins', BARE.flat()),
  ]),
  'runs-one-mount-with-history': judgementInput(
    [remountedCooler('Coated fins', [COATED.flat()]), remountedCooler('Bare fins', [BARE.flat()])],
    { bench: { mountSpread: 0.3, mountSpreadDegreesOfFreedom: 12 } },
  ),
  'runs-coarse-sensor': judgementInput([
    withFields(plainCooler('A', [40, 40, 41, 40]), () => ({ sensorStep: 1, withinStandardDeviation: 0.3 })),
    withFields(plainCooler('B', [42, 42, 42, 42]), () => ({ sensorStep: 1, withinStandardDeviation: 0.3 })),
  ]),
  'runs-unequal-numbers': judgementInput([
    plainCooler('A', [40.1, 40.4, 39.9]),
    plainCooler('B', [40.6, 41.1, 40.2, 40.8, 40.5, 41.0, 40.3, 40.9, 40.7, 40.6]),
  ]),
  'mixed-mounts': judgementInput([coated, remountedCooler('Bare fins', [BARE.flat()])]),
  'single-run-each': judgementInput([plainCooler('A', [41.2]), plainCooler('B', [42])]),
  'three-coolers': judgementInput([
    coated,
    remountedCooler(
      'Split fins',
      COATED.map((mount) => mount.map((value) => Number((value + 0.4).toFixed(1)))),
    ),
    bare,
  ]),
};

/** °C to K/W at 180 W, as decimals. */
function scaled(mounts: readonly (readonly number[])[]): number[][] {
  return mounts.map((mount) => mount.map((value) => Number((value / 180).toFixed(5))));
}
