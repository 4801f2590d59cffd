/** The tokens a chart needs, resolved to colours that the chart library understands. */
export interface ChartTheme {
  readonly plate: string;
  readonly plate2: string;
  readonly ink: string;
  readonly ink2: string;
  readonly ink3: string;
  readonly hair: string;
  readonly edge: string;
  readonly spirit: string;
  readonly spiritWash: string;
  readonly font: string;
}

const TOKENS: Record<Exclude<keyof ChartTheme, 'font'>, string> = {
  plate: '--plate',
  plate2: '--plate-2',
  ink: '--ink',
  ink2: '--ink-2',
  ink3: '--ink-3',
  hair: '--hair',
  edge: '--edge',
  spirit: '--spirit',
  spiritWash: '--spirit-wash',
};

/** Black on white, whatever the screen shows. */
export const PAPER_THEME: ChartTheme = {
  plate: '#fff',
  plate2: '#eee',
  ink: '#000',
  ink2: '#222',
  ink3: '#333',
  hair: '#bbb',
  edge: '#555',
  spirit: '#000',
  spiritWash: '#eee',
  font: 'IBM Plex Sans, sans-serif',
};

/**
 * Reads the theme in force where `element` stands. A token may be a `light-dark()` pair, which only resolves
 * as a colour of some element, so a probe takes each in turn.
 */
export function readChartTheme(element: HTMLElement): ChartTheme {
  const probe = element.ownerDocument.createElement('span');
  probe.hidden = true;
  element.append(probe);
  const colour = (token: string): string => {
    probe.style.color = `var(${token})`;
    return getComputedStyle(probe).color;
  };
  const colours = Object.entries(TOKENS).map(([name, token]) => [name, colour(token)] as const);
  const font = getComputedStyle(element).fontFamily;
  probe.remove();
  return { ...(Object.fromEntries(colours) as Omit<ChartTheme, 'font'>), font };
}
