import { JudgedCooler, PairResult } from '../contracts/judgement';
import { Evidence, filledMounts } from './evidence';
import { outliers } from './outliers';
import { permutationTest } from './permutation';
import { farFromMedian, trimmedTest } from './trimmed';

type Opinions = Pick<PairResult, 'permutation' | 'trimmed' | 'outliers'>;

/** Other tests of the same units, and units that stand out. They comment on the call and never replace it. */
export function secondOpinions(
  pair: PairResult,
  a: JudgedCooler,
  b: JudgedCooler,
  [first, second]: readonly [Evidence, Evidence],
  { rules, seed }: { readonly rules: { readonly confidence: number }; readonly seed: number },
): Opinions {
  const level = 1 - rules.confidence;
  const names = [...standingOut(a, first, level), ...standingOut(b, second, level)];
  const own = pair.basis === 'mounts' || pair.basis === 'runs';
  if (!own || pair.flag === 'not judged') return { permutation: null, trimmed: null, outliers: names };
  const outside = pair.flag === 'outside noise';
  const agrees = (p: number): boolean => p < level === outside;
  const permuted = permutationTest(first.values, second.values, seed);
  const trimmed = trimmedTest(first.values, second.values);
  return {
    permutation: permuted && { ...permuted, agrees: agrees(permuted.p) },
    trimmed: trimmed && { gap: trimmed.gap, p: trimmed.p, agrees: agrees(trimmed.p) },
    outliers: names,
  };
}

/** Units of a cooler that stand out, and runs within a mount that do. */
function standingOut(cooler: JudgedCooler, evidence: Evidence, level: number): string[] {
  const positions = new Set([...outliers(evidence.values, level), ...farFromMedian(evidence.values)]);
  const units = [...positions]
    .sort((x, y) => x - y)
    .map((position) => `${cooler.name}, ${evidence.unit} ${evidence.unitNames[position]}`);
  if (evidence.unit === 'run') return units;
  const runs = filledMounts(cooler).flatMap((mount) =>
    outliers(
      mount.runs.map(({ value }) => value),
      level,
    ).map((position) => `${cooler.name}, mount ${mount.name}, run ${mount.runs[position].name}`),
  );
  return [...units, ...runs];
}
