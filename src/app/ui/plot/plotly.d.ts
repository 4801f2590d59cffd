/** The bundle of Cartesian charts is the whole library with fewer trace kinds, so its types are those of the whole. */
declare module 'plotly.js-cartesian-dist-min' {
  const plotly: typeof import('plotly.js-dist-min') & {
    /** Missing from the library's published types. */
    readonly Fx: {
      hover(chart: HTMLElement, points: readonly { curveNumber: number; pointNumber: number }[]): void;
      unhover(chart: HTMLElement): void;
    };
  };
  export default plotly;
}
