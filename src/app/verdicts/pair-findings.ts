import { Finding, PairResult } from '../../../shared/contracts';

export interface PairFindings {
  /** About the pair shown, or about all: the pair's names are not said again. */
  readonly here: readonly Finding[];
  /** About the other pairs of more than two coolers. */
  readonly elsewhere: readonly Finding[];
}

/** A finding about one of several pairs begins with the pair's names. */
const opening = ({ a, b }: Pick<PairResult, 'a' | 'b'>): string => `${a} against ${b}: `;

/** Parts the findings of a verdict by the pair they are about. */
export function findingsByPair(
  findings: readonly Finding[],
  pairs: readonly Pick<PairResult, 'a' | 'b'>[],
  shown: number,
): PairFindings {
  const here: Finding[] = [];
  const elsewhere: Finding[] = [];
  for (const finding of findings) {
    const about = pairs.findIndex((pair) => finding.text.startsWith(opening(pair)));
    if (about >= 0 && about !== shown) elsewhere.push(finding);
    else
      here.push(about < 0 ? finding : { ...finding, text: finding.text.slice(opening(pairs[about]).length) });
  }
  return { here, elsewhere };
}
