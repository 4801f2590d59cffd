import type { Config, LayoutAxis, Layout } from 'plotly.js-dist-min';
import { ChartTheme } from './chart-theme';

/** The look that all charts share: ticks of the gap rule, no grid, no legend, labels at the lines' ends. */
export function chartTemplate(theme: ChartTheme): Partial<Layout> {
  return {
    paper_bgcolor: 'rgba(0,0,0,0)',
    plot_bgcolor: 'rgba(0,0,0,0)',
    font: { family: theme.font, size: 12, color: theme.ink2 },
    colorway: [theme.ink, theme.spirit],
    margin: { l: 48, r: 84, t: 8, b: 40 },
    showlegend: false,
    hovermode: 'closest',
    hoverlabel: {
      bgcolor: theme.plate2,
      bordercolor: theme.edge,
      font: { family: theme.font, color: theme.ink, size: 13 },
    },
    dragmode: false,
    transition: { duration: 0, easing: 'linear' },
    xaxis: chartAxis(theme),
    yaxis: chartAxis(theme),
  };
}

/** An axis with the tick grammar of the gap rule: short 0.1, long 0.5, numerals at the long ones. */
export function chartAxis(theme: ChartTheme): Partial<LayoutAxis> {
  return {
    showgrid: false,
    zeroline: false,
    showline: true,
    linecolor: theme.ink,
    linewidth: 1,
    ticks: 'outside',
    ticklen: 8,
    tickcolor: theme.ink,
    minor: { ticks: 'outside', ticklen: 4, tickcolor: theme.ink, dtick: 0.1, showgrid: false },
    dtick: 0.5,
    tickformat: '.1f',
    fixedrange: true,
    automargin: true,
  };
}

/** No tool bar: the buttons under a chart are our own. */
export const CHART_CONFIG: Partial<Config> = { displayModeBar: false, responsive: false };
