import type { Annotations, Data, Shape } from 'plotly.js-dist-min';
import { Judgement, JudgementInput, PairResult } from '../../../shared/contracts';
import { axisScale } from '../ui/plot/axis-scale';
import { chartAxis } from '../ui/plot/chart-template';
import { ChartTheme } from '../ui/plot/chart-theme';
import { Figure, PlotPoint } from '../ui/plot/plot';
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

const ROW = 18;
/** Over a cooler's first mount, for its name and its mean. */
const HEAD = 32;
/** Between a cooler's last line and the next head: the lines are drawn through their rows' middles. */
const TAIL = -4;
/** Between the last line and the axis. */
const FOOT = 6;
const AXIS = 48;

/** px */
export function dotsHeight(coolers: readonly DotCooler[]): number {
  return coolers.reduce((height, { mounts }) => height + HEAD + ROW * mounts.length + TAIL, FOOT) + AXIS;
}

const LONGEST_MOUNT_NAME = 12;

/** Dots on one line a mount; short bars at mount means, a long bar at the cooler's. One y unit is one pixel. */
export function dotsFigure(
  coolers: readonly DotCooler[],
  unit: Unit,
  quantity: string,
  decimals: number,
  theme: ChartTheme,
  width: number,
): Figure {
  const left = width < 560 ? 76 : 96;
  const right = 14;
  const plotHeight = dotsHeight(coolers) - AXIS;
  const values = coolers.flatMap(({ mounts }) =>
    mounts.flatMap(({ runs }) => runs.map(({ value }) => value)),
  );
  const scale = axisScale(values, width - left - right, unit === '°C' ? 0.1 : 0.0001);
  const data: Data[] = [];
  const shapes: Partial<Shape>[] = [];
  const annotations: Partial<Annotations>[] = [];
  let y = 0;
  for (const cooler of coolers) {
    const colour = cooler.part === 'compared' ? theme.spirit : theme.ink;
    const top = y + HEAD;
    annotations.push(
      words(cooler.name, { x: -left - 2, y: y + 13, xanchor: 'left', color: theme.ink, bold: true }),
    );
    cooler.mounts.forEach((mount, row) => {
      const rowY = top + row * ROW;
      shapes.push(line(0, 1, rowY, rowY, theme.hair, 1, 'paper'));
      annotations.push(
        words(shortened(mount.name), { x: -12, y: rowY, xanchor: 'right', color: theme.ink2, bold: false }),
      );
      if (mount.mean !== null) shapes.push(line(mount.mean, mount.mean, rowY - 7, rowY + 7, colour, 1.5));
      data.push(...rowTraces(cooler, mount, rowY, unit, theme, colour));
    });
    const bottom = top + (cooler.mounts.length - 1) * ROW + 10;
    if (cooler.mean !== null) {
      shapes.push(line(cooler.mean, cooler.mean, top - 11, bottom, colour, 1.5));
      annotations.push({
        x: cooler.mean,
        y: top - 18,
        text: `<b>mean ${formatNumber(cooler.mean, decimals)}</b>`,
        showarrow: false,
        font: { size: 12, color: colour, family: theme.font },
      });
    }
    y += HEAD + ROW * cooler.mounts.length + TAIL;
  }
  return {
    data,
    layout: {
      margin: { l: left, r: right, t: 0, b: AXIS },
      shapes,
      annotations: [
        ...annotations,
        {
          xref: 'paper',
          yref: 'paper',
          x: 1,
          y: 0,
          yshift: -AXIS - 3,
          xanchor: 'right',
          yanchor: 'bottom',
          showarrow: false,
          text: quantity,
          font: { size: 12, color: theme.ink2, family: theme.font },
        },
      ],
      xaxis: {
        ...chartAxis(theme),
        range: [...scale.range],
        dtick: scale.labelEvery,
        tickformat: scale.format,
        minor: { ...chartAxis(theme).minor, dtick: scale.minorEvery },
        ticklabeloverflow: 'allow',
        automargin: false,
      },
      yaxis: { visible: false, range: [plotHeight, 0], fixedrange: true },
    },
  };
}

function rowTraces(
  cooler: DotCooler,
  mount: DotMount,
  y: number,
  unit: Unit,
  theme: ChartTheme,
  colour: string,
): Data[] {
  const symbol = { reference: 'circle', compared: 'square', other: 'circle' }[cooler.part];
  return [false, true].map((leftOut): Data => {
    const runs = mount.runs.filter((run) => (run.leftOut !== null) === leftOut);
    return {
      type: 'scatter',
      mode: 'markers',
      x: runs.map(({ value }) => value),
      y: runs.map(() => y),
      text: runs.map((run) => runInWords(cooler, mount, run, unit)),
      hovertemplate: '%{text}<extra></extra>',
      marker: leftOut
        ? { symbol: 'x-thin', size: 8, line: { color: theme.ink3, width: 1.5 } }
        : {
            symbol,
            size: 8,
            color: cooler.part === 'reference' ? theme.plate : colour,
            line: { color: colour, width: 1.5 },
          },
    };
  });
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

function shortened(name: string): string {
  return name.length > LONGEST_MOUNT_NAME ? `${name.slice(0, LONGEST_MOUNT_NAME - 1)}…` : name;
}

function words(
  text: string,
  at: { x: number; y: number; xanchor: 'left' | 'right'; color: string; bold: boolean },
): Partial<Annotations> {
  return {
    xref: 'paper',
    x: 0,
    xshift: at.x,
    y: at.y,
    xanchor: at.xanchor,
    yanchor: 'middle',
    showarrow: false,
    text: at.bold ? `<b>${escaped(text)}</b>` : escaped(text),
    font: { size: at.bold ? 13 : 12, color: at.color },
  };
}

/** The chart library reads a few tags in its texts; names typed by people must not be read so. */
function escaped(text: string): string {
  return text.replace(/&/g, '&amp;').replace(/</g, '&lt;').replace(/>/g, '&gt;');
}

function line(
  x0: number,
  x1: number,
  y0: number,
  y1: number,
  color: string,
  width: number,
  xref: 'x' | 'paper' = 'x',
): Partial<Shape> {
  return { type: 'line', xref, x0, x1, y0, y1, line: { color, width }, layer: 'below' };
}
