import { JudgedCooler, PairResult } from '../contracts/judgement';
import { normalQuantile } from '../numerics';
import { degreesOfFreedomCap, Evidence, runsOf, side } from './evidence';
import { Rules } from './judge-pair';
import { quickWelchPower } from './welch-power';

/** Beyond so many units a bench is not asked. */
const MOST = 500;

/**
 * Fewest units per cooler at which Welch's test finds the gap that matters as often as the thresholds ask, if spreads stay as
 * measured; degrees of freedom are those of each number. Null beyond 500.
 */
export function unitsNeeded(
  a: JudgedCooler,
  b: JudgedCooler,
  [first, second]: readonly [Evidence, Evidence],
  rules: Rules,
): PairResult['unitsNeeded'] {
  const mounts = first.unit === 'mount';
  const fewest = mounts ? 2 : 3;
  const enough = (units: number): boolean => {
    const power = quickWelchPower(
      { ...side(first), units },
      { ...side(second), units },
      { confidence: rules.confidence, degreesOfFreedomCap: degreesOfFreedomCap(first.unit, units) },
    );
    return power !== null && power.powerAt(rules.gapThatMatters) >= rules.power;
  };
  const reach = normalQuantile((1 + rules.confidence) / 2) + normalQuantile(rules.power);
  const rough = (reach / rules.gapThatMatters) ** 2 * (first.variance + second.variance);
  if (rough > MOST) return null;
  // The normal's answer is a unit or two too low; from there step to the edge.
  let units = Math.max(fewest, Math.ceil(rough) + 1);
  if (enough(units)) while (units > fewest && enough(units - 1)) units--;
  else while (units <= MOST && !enough(units)) units++;
  if (units > MOST) return null;
  const now = Math.min(first.values.length, second.values.length);
  const runsNow = Math.min(runsOf(a).length, runsOf(b).length);
  const perMount = mounts ? Math.max(1, Math.round(runsNow / now)) : 1;
  return { unit: first.unit, units, runs: units * perMount };
}
