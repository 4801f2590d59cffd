import { PAPER_THEME } from '../ui/plot/chart-theme';
import { dotCoolers, dotPoints, mountInWords } from './run-dots';
import { dotsFigure } from './run-dots-figure';
import { finVerdict } from './verdict-fixture';

interface Trace {
  readonly x: number[];
  readonly text: string[];
  readonly marker: { readonly symbol: string };
}

describe('every run as a dot', () => {
  const { input, judgement } = finVerdict();
  const pair = judgement.pairs[0];

  it('puts the reference first, with every run in its mount and the mount’s mean', () => {
    const coolers = dotCoolers(input, judgement, pair);
    expect(coolers.map(({ name, part }) => [name, part])).toEqual([
      ['Bare fins', 'reference'],
      ['Coated fins', 'compared'],
    ]);
    expect(coolers[0].mounts[2].runs.map(({ value }) => value)).toEqual([42.23, 42.01]);
    expect(coolers[0].mounts[2].mean).toBeCloseTo(42.12, 10);
  });

  it('tells the coolers apart by shape', () => {
    const { data } = dotsFigure(dotCoolers(input, judgement, pair), '°C', '', 2, PAPER_THEME, 800);
    const symbols = (data as unknown as Trace[])
      .filter(({ x }) => x.length > 0)
      .map(({ marker }) => marker.symbol);
    expect(symbols).toEqual([...Array<string>(5).fill('circle'), ...Array<string>(5).fill('square')]);
  });

  it('keeps a run left out, as a cross with its reason, and out of the other marks', () => {
    const [run] = input.coolers[1].mounts[0].runs;
    const leftOut = [
      { cooler: 'Bare fins', mount: '1', run: { ...run, name: '3', value: 43.1 }, reason: 'Fan clip loose' },
    ];
    const coolers = dotCoolers({ ...input, leftOut }, judgement, pair);
    const traces = dotsFigure(coolers, '°C', '', 2, PAPER_THEME, 800).data as unknown as Trace[];
    expect(traces[0].x).toEqual([42.56, 42.38]);
    expect(traces[1]).toMatchObject({ x: [43.1], marker: { symbol: 'x-thin' } });
    expect(traces[1].text[0]).toContain('left out: Fan clip loose');
  });

  it('gives the arrow keys the trace and place each dot has in the figure', () => {
    const coolers = dotCoolers(input, judgement, pair);
    const traces = dotsFigure(coolers, '°C', '', 2, PAPER_THEME, 800).data as unknown as Trace[];
    const points = dotPoints(coolers, '°C');
    expect(points).toHaveLength(20);
    for (const { curve, index, words } of points) expect(traces[curve].text[index]).toBe(words);
    expect(points[0].words).toBe('Bare fins, mount 1, run 1: 42.56\u00a0°C, number 2 in test order');
  });

  it('does not let a name pass for a tag of the chart library', () => {
    const named = dotCoolers(input, judgement, pair).map((cooler) => ({ ...cooler, name: '<b>A & B' }));
    const texts = dotsFigure(named, '°C', '', 2, PAPER_THEME, 800).layout.annotations?.map(
      ({ text }) => text,
    );
    expect(texts).toContain('<b>&lt;b&gt;A &amp; B</b>');
  });

  it('says runs where mounts were not recorded', () => {
    expect(mountInWords('', false)).toBe('runs');
    expect(mountInWords('3', true)).toBe('mount 3');
    expect(mountInWords('north, 3', true)).toBe('north, 3');
  });
});
