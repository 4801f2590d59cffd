import type plotly from 'plotly.js-cartesian-dist-min';

export type Plotly = typeof plotly;

/** Fetches the chart library the first time a chart is shown; it is the largest piece of the application. */
export async function loadPlotly(): Promise<Plotly> {
  return (await import('plotly.js-cartesian-dist-min')).default;
}
