import { drawGapRule, GapRuleFrame } from './gap-rule-drawing';
import { FIN_PAIR } from './gap-rule-fixtures';
import { GapRulePair, needleShape } from './gap-rule-pair';
import { gapScale, sharedDomain, wholeFor } from './gap-scale';
import { snap } from './ticks';

const WIDE: GapRuleFrame = { width: 1328, pixelRatio: 1, flag: true };
const PHONE: GapRuleFrame = { width: 358, pixelRatio: 2, flag: false };

const draw = (pair: GapRulePair | null, frame: GapRuleFrame, gapThatMatters: number | null = 0.5) =>
  drawGapRule({ pair, unit: pair?.unit ?? '°C', gapThatMatters }, frame);
const numbersOf = (path: string): number[] => (path.match(/-?\d+(\.\d+)?/g) ?? []).map(Number);

describe('scale of the gap rule', () => {
  it('puts zero in the middle and the ends 14 px inside', () => {
    const scale = gapScale(FIN_PAIR, '°C', 1328);
    expect(scale.reach).toBe(2);
    expect(scale.x(0)).toBe(664);
    expect(scale.x(-2)).toBe(14);
    expect(scale.x(2)).toBe(1314);
  });

  it('reaches at least 1.5 °C on a phone and 2 °C where it is wide', () => {
    const small = { ...FIN_PAIR, gap: 0.1, marginOfError: 0.2 };
    expect(gapScale(small, '°C', 358).reach).toBe(1.5);
    expect(gapScale(small, '°C', 720).reach).toBe(2);
  });

  it('leaves a fifth of a degree beyond the farthest mark', () => {
    expect(gapScale({ ...FIN_PAIR, gap: 2.2, marginOfError: 0.6 }, '°C', 1328).reach).toBe(3);
    expect(gapScale({ ...FIN_PAIR, gap: 2.2, marginOfError: 0.61 }, '°C', 1328).reach).toBe(3.5);
    expect(gapScale({ ...FIN_PAIR, gap: 0, marginOfError: 0.1, gapThatMatters: 2.4 }, '°C', 1328).reach).toBe(
      3,
    );
  });

  it('chooses the decade of a resistance so that the farthest mark is between 0.3 and 3 long ticks out', () => {
    for (const largest of [0.00021, 0.0068, 0.03, 0.031, 0.9, 4]) {
      const inTicks = largest / wholeFor(largest, 'K/W');
      expect(inTicks).toBeGreaterThan(0.3 - 1e-12);
      expect(inTicks).toBeLessThanOrEqual(3 + 1e-12);
    }
  });
});

describe('ticks of the gap rule', () => {
  it('draws 41 tenths over ±2 °C: 5 long, 4 mid, 32 short', () => {
    const { ticks } = draw(FIN_PAIR, WIDE);
    const count = (path: string): number => path.split('M').length - 1;
    expect([count(ticks.long), count(ticks.mid), count(ticks.short)]).toEqual([5, 4, 32]);
    expect(ticks.worth).toBe(0.1);
  });

  it('names wholes and halves with a true minus, and no half at the ends', () => {
    expect(draw(FIN_PAIR, WIDE).ticks.numerals.map(({ text }) => text)).toEqual([
      '\u22122',
      '\u22121.5',
      '\u22121',
      '\u22120.5',
      '0',
      '+0.5',
      '+1',
      '+1.5',
      '+2',
    ]);
    expect(draw(FIN_PAIR, PHONE).ticks.numerals.map(({ text }) => text)).toEqual([
      '\u22121',
      '\u22120.5',
      '0',
      '+0.5',
      '+1',
    ]);
  });

  it('drops the tenths where they would stand under 4 px apart, and says what a tick is worth', () => {
    const wideGap = { ...FIN_PAIR, gap: 5, marginOfError: 0.5, interval: [4.5, 5.5] as const };
    const { ticks } = draw(wideGap, PHONE);
    expect(ticks.worth).toBe(0.5);
    expect(ticks.short).toBe('');
    expect(ticks.numerals.some(({ half }) => half)).toBe(false);
  });

  it('keeps ticks and numerals apart however far the gap is', () => {
    const far = { ...FIN_PAIR, gap: 41, marginOfError: 0.5, interval: [40.5, 41.5] as const };
    const { ticks } = draw(far, PHONE);
    const xs = numbersOf(ticks.long + ticks.mid)
      .filter((_, i) => i % 3 === 0)
      .sort((p, q) => p - q);
    const closest = Math.min(...xs.slice(1).map((x, i) => x - xs[i]));
    expect(closest).toBeGreaterThanOrEqual(3.5);
    const numerals = ticks.numerals.map(({ x }) => x);
    expect(Math.min(...numerals.slice(1).map((x, i) => x - numerals[i]))).toBeGreaterThan(20);
  });

  it('snaps to where device pixels draw every tick equally black', () => {
    expect(snap(46.5, 1, 1)).toBe(46.5);
    expect(snap(46.9, 1, 1)).toBe(46.5);
    expect(snap(47.1, 1, 2)).toBe(47);
    expect(snap(47.1, 1.5, 2)).toBe(47.25);
  });
});

describe('marks of the gap rule', () => {
  it('ends band, bracket and needle where the numbers put them', () => {
    const { band, bracket, needle } = draw(FIN_PAIR, { ...WIDE, flag: false });
    expect(band).toEqual({ x: 468.12, y: 46, width: 391.76, height: 34 });
    expect(bracket?.path).toBe('M264.67 29V20H656.43V29');
    expect(needle?.x).toBe(460.55);
  });

  it('has the needle clear the band exactly when the bracket clears zero', () => {
    for (const gap of [-0.7, -0.6028, -0.6026, 0.2, 0.6026, 0.6028, 1]) {
      const pair = { ...FIN_PAIR, gap, interval: [gap - 0.6027, gap + 0.6027] as const };
      const { band, bracket, needle } = draw(pair, { ...WIDE, width: 200_000 });
      const [left, , , right] = numbersOf(bracket?.path ?? '');
      const clearsBand = needle!.x < band!.x || needle!.x > band!.x + band!.width;
      expect(clearsBand).toBe(left > 100_000 || right < 100_000);
    }
  });

  it('keeps the drawing of a resistance on the same rule, a tick being a thousandth', () => {
    const { ticks, bracketEnds } = draw(
      {
        ...FIN_PAIR,
        unit: 'K/W',
        gap: -0.0035,
        marginOfError: 0.0033,
        interval: [-0.0068, -0.0002],
        gapThatMatters: 0.0028,
      },
      WIDE,
    );
    expect(ticks.worth).toBeCloseTo(0.001, 12);
    expect(ticks.numerals.filter(({ half }) => !half).map(({ text }) => text)).toEqual([
      '\u22120.02',
      '\u22120.01',
      '0',
      '+0.01',
      '+0.02',
    ]);
    expect(bracketEnds.map(({ text }) => text)).toEqual(['\u22120.0068', '\u22120.0002']);
  });

  it('flies the headline right of a needle in the left half and left of one in the right half', () => {
    expect(draw(FIN_PAIR, WIDE).pole).toMatchObject({ x: 460.55, textSide: 'right' });
    expect(draw({ ...FIN_PAIR, gap: 0.63 }, WIDE).pole?.textSide).toBe('left');
    expect(draw(FIN_PAIR, PHONE).pole).toBeNull();
  });

  it('leaves an unmarked rule its ticks, zero and notches', () => {
    const unmarked = draw(null, WIDE);
    expect(unmarked.notches).toHaveLength(2);
    expect([unmarked.needle, unmarked.band, unmarked.bracket, unmarked.pole]).toEqual([
      null,
      null,
      null,
      null,
    ]);
  });

  it('draws no noise where none was measured, and says so away from the needle', () => {
    const single: GapRulePair = {
      ...FIN_PAIR,
      gap: 0.38,
      marginOfError: null,
      interval: null,
      flag: 'not judged',
      notJudgedCode: 'single run each',
    };
    const drawing = draw(single, WIDE);
    expect([drawing.band, drawing.bracket]).toEqual([null, null]);
    expect(drawing.noNoise).toMatchObject({ text: 'noise not measured', anchor: 'end' });
    expect(draw({ ...single, gap: -1 }, WIDE).noNoise?.anchor).toBe('start');
  });

  it('tells the six states apart by shape', () => {
    const call = (
      flag: GapRulePair['flag'],
      sizeCall: GapRulePair['sizeCall'],
      notJudgedCode: string | null = null,
    ) => needleShape({ flag, sizeCall, notJudgedCode });
    expect(call('outside noise', 'matters')).toBe('solid');
    expect(call('outside noise', 'size open')).toBe('solid');
    expect(call('outside noise', 'too small to matter')).toBe('half');
    expect(call('within noise', 'too small to matter')).toBe('hollow');
    expect(call('within noise', 'size open')).toBe('broken');
    expect(call('not judged', 'size open', 'single run each')).toBe('ring');
    expect(call('not judged', 'size open', 'no spread measured')).toBe('open V');
  });

  it('keeps both values of a far bracket on the page', () => {
    const far = { ...FIN_PAIR, gap: -41, marginOfError: 1, interval: [-42, -40] as const };
    const { bracketEnds } = draw(far, PHONE);
    expect(bracketEnds[0].x - 6.5 * bracketEnds[0].text.length).toBeGreaterThan(-16);
  });

  it('drops the word at a side where the needle stands', () => {
    const far = { ...FIN_PAIR, gap: -9, marginOfError: 1, interval: [-10, -8] as const };
    expect(draw(far, PHONE).sides.map(({ text }) => text)).toEqual(['higher →']);
    expect(draw(FIN_PAIR, WIDE).sides.map(({ text }) => text)).toEqual([
      '← Coated fins lower',
      'Coated fins higher →',
    ]);
  });

  it('dashes the bracket only where the verdict is unresolved', () => {
    const within = {
      ...FIN_PAIR,
      gap: 0.36,
      interval: [-0.24, 0.96] as const,
      flag: 'within noise' as const,
    };
    expect(draw(within, WIDE).bracket?.dashed).toBe(true);
    expect(draw({ ...within, sizeCall: 'too small to matter' }, WIDE).bracket?.dashed).toBe(false);
    expect(draw(FIN_PAIR, WIDE).bracket?.dashed).toBe(false);
  });
});

describe('shared domain of a list', () => {
  it('is ±2 °C, widens for the largest gap and stops at ±6 °C', () => {
    const of = (...gaps: (number | null)[]) =>
      sharedDomain(
        gaps.map((gap) => ({ gap, gapThatMatters: 0.5 })),
        '°C',
      );
    expect(of(-0.6, 1.4, null)).toBe(2);
    expect(of(-0.6, 2.9)).toBe(3.5);
    expect(of(31)).toBe(6);
    expect(of()).toBe(2);
  });
});
