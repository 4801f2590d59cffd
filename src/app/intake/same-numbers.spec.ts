import { RunSummary } from '../../../shared/contracts/run-summary';
import { sameNumbers } from './same-numbers';

const summary = {
  rise: 28.32,
  resistance: null,
  window: { from: 600, to: 1800, reason: 'pump stopped' },
  within: { standardError: 0.029 },
  findings: [{ code: 'x' }],
} as unknown as RunSummary;

describe('sameNumbers', () => {
  it('holds after a way through JSON, whatever the order of the fields', () => {
    const turned = Object.fromEntries(Object.entries(summary).reverse());
    expect(sameNumbers(summary, JSON.parse(JSON.stringify(turned)) as RunSummary)).toBe(true);
  });

  it.each([
    ['the last digit of the rise', { rise: 28.320000000000004 }],
    ['an end of the window', { window: { ...summary.window, to: 1799 } }],
    ['the standard error', { within: { ...summary.within, standardError: 0.03 } }],
    ['a resistance only one has', { resistance: 0.2363 }],
  ])('sees another value: %s', (_, change) => {
    expect(sameNumbers(summary, { ...summary, ...change })).toBe(false);
  });

  it('does not ask for the same words', () => {
    expect(sameNumbers(summary, { ...summary, findings: [] })).toBe(true);
  });
});
