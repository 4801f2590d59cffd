import { Finding } from '../../../shared/contracts';
import { findingsByPair } from './pair-findings';

describe('findings by pair', () => {
  const pairs = [
    { a: 'T1', b: 'T2' },
    { a: 'T1', b: 'T3' },
  ];
  const finding = (text: string): Finding => ({ code: 'x', level: 'note', title: 'X', text, numbers: {} });
  const texts = (findings: readonly Finding[]): string[] => findings.map(({ text }) => text);

  it('shows those of the pair shown and of all, and keeps the others apart under their names', () => {
    const all = ['T1 against T2: Mixed.', 'T1 against T3: Blocked.', 'One run was left out.'].map(finding);
    const { here, elsewhere } = findingsByPair(all, pairs, 1);
    expect(texts(here)).toEqual(['Blocked.', 'One run was left out.']);
    expect(texts(elsewhere)).toEqual(['T1 against T2: Mixed.']);
  });

  it('loses none', () => {
    const all = ['T1 against T2: Mixed.', 'T1 against T2 and T3.', ''].map(finding);
    const { here, elsewhere } = findingsByPair(all, pairs, 1);
    expect(here.length + elsewhere.length).toBe(3);
  });
});
