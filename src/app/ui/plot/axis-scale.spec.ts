import { axisScale } from './axis-scale';

describe('axis of a chart', () => {
  it('marks tenths and names halves of a degree over the runs of a fin pair', () => {
    expect(axisScale([40.7, 42.56], 700, 0.1)).toEqual({
      range: [40.5, 43],
      labelEvery: 0.5,
      minorEvery: 0.1,
      decimals: 1,
      format: '.1f',
    });
  });

  it('names wholes where halves would run together', () => {
    const scale = axisScale([40.7, 42.56], 200, 0.1);
    expect(scale.labelEvery).toBe(1);
    expect(scale.format).toBe('.0f');
  });

  it('never marks less than the smallest tick, however close the values are', () => {
    expect(axisScale([41.31, 41.31], 700, 0.1).minorEvery).toBe(0.1);
  });

  it('keeps every value inside the range, with room at both ends', () => {
    for (const [low, high, pixels] of [
      [0.2261, 0.2364, 700],
      [-3.2, 61, 270],
      [40, 40.5, 700],
    ]) {
      const { range } = axisScale([low, high], pixels, 0.0001);
      expect(range[0]).toBeLessThan(low);
      expect(range[1]).toBeGreaterThan(high);
    }
  });
});
