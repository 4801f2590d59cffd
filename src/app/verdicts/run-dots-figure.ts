import type { Annotations, Data, Shape } from 'plotly.js-dist-min';
import { axisScale } from '../ui/plot/axis-scale';
import { chartAxis } from '../ui/plot/chart-template';
import { ChartTheme } from '../ui/plot/chart-theme';
import { Figure } from '../ui/plot/plot';
import { formatNumber, Unit } from '../ui/quantity/quantity-format';
import { DotCooler, DotMount, runInWords } from './run-dots';

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
/** Room kept at the right until the last label's width is known, px. */
const LAST_LABEL = 20;
/** Width of a bold figure at 13 px and of `mean 41.31`, generous, px. */
const BOLD_FIGURE = 7.4;
const MEAN_LABEL = 76;

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
  const plotHeight = dotsHeight(coolers) - AXIS;
  const values = coolers.flatMap(({ mounts }) =>
    mounts.flatMap(({ runs }) => runs.map(({ value }) => value)),
  );
  const scale = axisScale(values, width - left - LAST_LABEL, unit === '°C' ? 0.01 : 0.0001);
  const right = Math.ceil(formatNumber(scale.range[1], scale.decimals).length * 3.4) + 1;
  const [from, to] = scale.range;
  const pixel = (value: number): number => left + ((value - from) / (to - from)) * (width - left - right);
  const data: Data[] = [];
  const shapes: Partial<Shape>[] = [];
  const annotations: Partial<Annotations>[] = [];
  let y = 0;
  for (const cooler of coolers) {
    const colour = cooler.part === 'compared' ? theme.spirit : theme.ink;
    const top = y + HEAD;
    const meanX = cooler.mean === null ? width : pixel(cooler.mean);
    const besideBar = meanX - MEAN_LABEL / 2 < cooler.name.length * BOLD_FIGURE + 8;
    const nameEnd = besideBar ? meanX : meanX - MEAN_LABEL / 2;
    const name = shortened(cooler.name, Math.max(10, Math.floor((nameEnd - 8) / BOLD_FIGURE)));
    annotations.push(words(name, { x: -left - 2, y: y + 13, xanchor: 'left', color: theme.ink, bold: true }));
    cooler.mounts.forEach((mount, row) => {
      const rowY = top + row * ROW;
      shapes.push(line(0, 1, rowY, rowY, theme.hair, 1, 'paper'));
      annotations.push(
        words(shortened(mount.name, LONGEST_MOUNT_NAME), {
          x: -12,
          y: rowY,
          xanchor: 'right',
          color: theme.ink2,
          bold: false,
        }),
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
        xanchor: besideBar && meanX + MEAN_LABEL < width ? 'left' : 'center',
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

function shortened(name: string, longest: number): string {
  return name.length > longest ? `${name.slice(0, longest - 1)}…` : name;
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
