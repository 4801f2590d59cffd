import { PairRow } from '../../../../shared/contracts';
import { drawSmallGapRule } from './small-gap-rule-drawing';

const ROW: PairRow = {
  a: 'Coated fins',
  b: 'Bare fins',
  gap: -0.63,
  marginOfError: 0.6,
  clearance: 1.04,
  gapThatMatters: 0.5,
  flag: 'outside noise',
  sizeCall: 'size open',
  notJudgedCode: null,
  headline: 'Outside noise, only just',
};
const draw = (row: Partial<PairRow>, domain = 2) =>
  drawSmallGapRule({ ...ROW, ...row }, domain, '°C', { width: 420, pixelRatio: 1 });

describe('small gap rule', () => {
  it('stands in the domain of its list', () => {
    expect(draw({}).needle?.x).toBe(145.11);
    expect(draw({}, 4).needle?.x).toBe(177.56);
    expect(draw({}).bracket?.path).toBe('M83.31 8V4H206.91V8');
  });

  it('leaves band and bracket open where they run beyond the list', () => {
    const { band, bandEnds, bracket } = draw({ gap: 1.5, marginOfError: 2.5, flag: 'within noise' });
    expect(band).toEqual({ x: 4, width: 412 });
    expect(bandEnds).toBe('');
    expect(bracket).toEqual({ path: 'M107 8V4H416', dashed: true });
  });

  it('stands at the end with the value in words when the gap is beyond the list', () => {
    expect(draw({ gap: 7.4 }, 6)).toMatchObject({
      needle: { x: 416 },
      beyond: { text: '+7.40\u00a0°C »', anchor: 'end' },
    });
    expect(draw({ gap: -7.4 }, 6)).toMatchObject({
      needle: { x: 4 },
      beyond: { text: '« \u22127.40\u00a0°C', anchor: 'start' },
    });
  });

  it('has no needle without a gap, and no noise where none was measured', () => {
    const { needle, band, bracket } = draw({ gap: null, marginOfError: null, flag: 'not judged' });
    expect([needle, band, bracket]).toEqual([null, null, null]);
  });
});
