import { Judgement, JudgementInput, PairResult } from '../../../shared/contracts';
import { PlotPoint } from '../ui/plot/plot';
import { decimalsFor, formatNumber, Unit, withUnit } from '../ui/quantity/quantity-format';

/** How a cooler's runs are marked: shape first, colour second. */
type Part = 'reference' | 'compared' | 'other';

export interface DotRun {
  readonly name: string;
  readonly value: number;
  readonly order: number | null;
  readonly leftOut: string | null;
}

export interface DotMount {
  readonly name: string;
  readonly mean: number | null;
  readonly runs: readonly DotRun[];
}

export interface DotCooler {
  readonly name: string;
  readonly part: Part;
  readonly mean: number | null;
  readonly mounts: readonly DotMount[];
}

/** Every run of a verdict by cooler and mount: the pair's reference first, then the compared, then the others. */
export function dotCoolers(
  input: JudgementInput,
  judgement: Judgement,
  pair: Pick<PairResult, 'a' | 'b'>,
): DotCooler[] {
  const value = { reference: 0, compared: 1, other: 2 };
  return input.coolers
    .map((cooler): DotCooler => {
      const result = judgement.coolers.find(({ name }) => name === cooler.name);
      const leftOut = input.leftOut.filter((run) => run.cooler === cooler.name);
      const names = [
        ...new Set([...cooler.mounts.map(({ name }) => name), ...leftOut.map(({ mount }) => mount ?? '')]),
      ];
      return {
        name: cooler.name,
        part: cooler.name === pair.b ? 'reference' : cooler.name === pair.a ? 'compared' : 'other',
        mean: result?.mean ?? null,
        mounts: names.map((name) => ({
          name: mountInWords(name, cooler.mountsRecorded),
          mean: cooler.mountsRecorded
            ? (result?.mountMeans.find((mount) => mount.name === name)?.mean ?? null)
            : null,
          runs: [
            ...(cooler.mounts.find((mount) => mount.name === name)?.runs ?? []).map((run) => ({
              ...pick(run),
              leftOut: null,
            })),
            ...leftOut
              .filter(({ mount }) => (mount ?? '') === name)
              .map(({ run, reason }) => ({ ...pick(run), leftOut: reason })),
          ],
        })),
      };
    })
    .sort((one, other) => value[one.part] - value[other.part]);
}

function pick({ name, value, order }: DotRun | Omit<DotRun, 'leftOut'>): Omit<DotRun, 'leftOut'> {
  return { name, value, order };
}

/** `mount 3` for a bare number, else the name as given. */
export function mountInWords(name: string, recorded: boolean): string {
  if (!recorded || name === '') return 'runs';
  return /^\d+$/.test(name) ? `mount ${name}` : name;
}

/** Stops for the arrow keys, in reading order. Every mount has two traces: runs judged, runs left out. */
export function dotPoints(coolers: readonly DotCooler[], unit: Unit): PlotPoint[] {
  return coolers
    .flatMap((cooler) => cooler.mounts.map((mount) => ({ cooler, mount })))
    .flatMap(({ cooler, mount }, row) =>
      [false, true].flatMap((leftOut, trace) =>
        mount.runs
          .filter((run) => (run.leftOut !== null) === leftOut)
          .map((run, index) => ({
            curve: 2 * row + trace,
            index,
            words: runInWords(cooler, mount, run, unit),
          })),
      ),
    );
}

/** `Bare fins, mount 3, run 2: 42.01 °C, 14th in test order`. */
export function runInWords(cooler: DotCooler, mount: DotMount, run: DotRun, unit: Unit): string {
  const place = mount.name === 'runs' ? cooler.name : `${cooler.name}, ${mount.name}`;
  const name = /^\d+$/.test(run.name) ? `run ${run.name}` : run.name;
  const value = withUnit(formatNumber(run.value, decimalsFor(null, unit)), unit);
  const order = run.order === null ? '' : `, number ${run.order} in test order`;
  return `${place}, ${name}: ${value}${order}${run.leftOut === null ? '' : `, left out: ${run.leftOut}`}`;
}
