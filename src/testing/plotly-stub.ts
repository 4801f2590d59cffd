/** Stands in for the chart library in component specs: it draws nothing and remembers what it was asked. */
export const plotlyCalls = {
  react: jest.fn((element: HTMLElement) => Promise.resolve(element)),
  purge: jest.fn(),
  toImage: jest.fn(() => Promise.resolve('data:image/svg+xml,%3Csvg%3E%3C%2Fsvg%3E')),
  hover: jest.fn(),
  unhover: jest.fn(),
};

export function loadPlotly(): Promise<unknown> {
  const { hover, unhover, ...calls } = plotlyCalls;
  return Promise.resolve({ ...calls, Fx: { hover, unhover } });
}
