import { formatDay, formatMoment } from './moment-format';

describe('moment format', () => {
  const now = new Date(2026, 2, 12, 15, 0);
  const local = (...parts: [number, number, number, number, number]): string =>
    new Date(...parts).toISOString();

  it('says today, then day and month, then the year when it is another', () => {
    expect(formatMoment(local(2026, 2, 12, 9, 41), now)).toBe('today 09:41');
    expect(formatMoment(local(2026, 2, 2, 9, 5), now)).toBe('2 Mar 09:05');
    expect(formatMoment(local(2025, 11, 30, 23, 59), now)).toBe('30 Dec 2025 23:59');
    expect(formatDay(local(2026, 1, 3, 0, 0), now)).toBe('3 Feb');
  });
});
