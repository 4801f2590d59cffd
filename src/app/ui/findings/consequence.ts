import { FindingLevel } from '../../../../shared/contracts';

/** What a finding does to the verdict, in the words used everywhere. */
export const CONSEQUENCE: Record<FindingLevel, string> = {
  stop: 'blocks sign-off',
  caution: 'weakens the verdict',
  note: 'no effect on the verdict',
};

const WEIGHT: Record<FindingLevel, number> = { stop: 0, caution: 1, note: 2 };

/** Worst first; findings of one level keep their order. */
export function byConsequence<T extends { readonly level: FindingLevel }>(findings: readonly T[]): T[] {
  return [...findings].sort((one, other) => WEIGHT[one.level] - WEIGHT[other.level]);
}

/** `2 weaken the verdict, 0 block sign-off`. */
export function countsInWords(findings: readonly { readonly level: FindingLevel }[]): string {
  const count = (level: FindingLevel): number => findings.filter((finding) => finding.level === level).length;
  const [weaken, block] = [count('caution'), count('stop')];
  return `${weaken} ${weaken === 1 ? 'weakens' : 'weaken'} the verdict, ${block} ${block === 1 ? 'blocks' : 'block'} sign-off`;
}
