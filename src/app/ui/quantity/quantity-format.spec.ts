import {
  decimalsFor,
  decimalsForGap,
  formatInterval,
  formatLevel,
  formatNumber,
  formatRatio,
  formatSigned,
  withUnit,
} from './quantity-format';

describe('quantity format', () => {
  it('uses a true minus, a plus on positive gaps, and no sign on what shows as zero', () => {
    expect(formatSigned(-0.628, 2)).toBe('\u22120.63');
    expect(formatSigned(0.38, 2)).toBe('+0.38');
    expect(formatSigned(-0.001, 2)).toBe('0.00');
    expect(formatSigned(0.001, 2)).toBe('0.00');
    expect(formatNumber(-12.5, 1)).toBe('\u221212.5');
  });

  it('keeps a unit on the same line as its number', () => {
    expect(withUnit('0.60', '°C')).toBe('0.60\u00a0°C');
  });

  it('never rounds gap ÷ margin across the edge of the noise', () => {
    expect(formatRatio(0.998)).toBe('0.99×');
    expect(formatRatio(0.9999999)).toBe('0.99×');
    expect(formatRatio(1)).toBe('1.00×');
    expect(formatRatio(1.0000001)).toBe('1.01×');
    expect(formatRatio(1.004)).toBe('1.01×');
    expect(formatRatio(1.037)).toBe('1.04×');
    expect(formatRatio(0.574)).toBe('0.57×');
  });

  it('shows one digit more than the uncertainty supports', () => {
    expect(decimalsFor(0.6, '°C')).toBe(2);
    expect(decimalsFor(0.04, '°C')).toBe(3);
    expect(decimalsFor(12, '°C')).toBe(2);
    expect(decimalsFor(null, '°C')).toBe(2);
    expect(decimalsFor(0.0033, 'K/W')).toBe(4);
    expect(decimalsFor(0.00033, 'K/W')).toBe(5);
  });

  it('adds digits until gap and margin show on the side they are on', () => {
    expect(decimalsForGap(-0.6021, 0.5986, '°C')).toBe(3);
    expect(decimalsForGap(-0.63, 0.6, '°C')).toBe(2);
  });

  it('adds digits until an end of the interval that is not zero does not show as zero', () => {
    const decimals = decimalsForGap(-0.624, 0.62, '°C');
    expect(formatInterval([-1.244, -0.004], decimals)).toBe('\u22121.244 to \u22120.004');
  });

  it('writes levels as they were set', () => {
    expect(formatLevel(0.95)).toBe('95%');
    expect(formatLevel(0.995)).toBe('99.5%');
    expect(formatLevel(0.93)).toBe('93%');
  });
});
