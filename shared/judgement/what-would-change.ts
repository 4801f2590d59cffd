import { JudgedCooler, PairResult } from '../contracts/judgement';
import {
  degreesOfFreedomCap,
  Evidence,
  filledMounts,
  mountEvidence,
  runEvidence,
  runsOf,
  side,
  UnitOfEvidence,
} from './evidence';
import { isOutside, Side, welch, WelchOptions, WelchResult } from './welch';

/** Margin and clearance now and with more units of each cooler, if spread and gap stay as measured. */
export function moreEvidence(
  a: JudgedCooler,
  b: JudgedCooler,
  [first, second]: readonly [Evidence, Evidence],
  now: WelchResult,
  confidence: number,
): PairResult['more'] {
  const least = Math.min(first.values.length, second.values.length);
  const runsNow = Math.min(runsOf(a).length, runsOf(b).length);
  const mounts = first.unit === 'mount';
  const perMount = mounts ? Math.max(1, Math.round(runsNow / least)) : 1;
  const row = (units: number, margin: number) => ({
    mounts: mounts ? units : null,
    runs: units === least ? runsNow : units * perMount,
    marginOfError: margin,
    clearance: Math.abs(now.gap) / margin,
  });
  const rows = [row(least, now.marginOfError)];
  for (const factor of [1.4, 2, 2.8]) {
    const units = Math.ceil(least * factor);
    const options = { confidence, degreesOfFreedomCap: degreesOfFreedomCap(first.unit, units) };
    const then = welch({ ...side(first), units }, { ...side(second), units }, options);
    if (then) rows.push(row(units, then.marginOfError));
  }
  return rows;
}

/** Every cooler that is this one less one unit, with the name of what was left out. */
function lessOne(
  cooler: JudgedCooler,
  unit: UnitOfEvidence,
): { readonly left: string; readonly rest: JudgedCooler }[] {
  const mounts = filledMounts(cooler);
  if (unit === 'mount')
    return mounts.map((gone) => ({
      left: `${cooler.name}, mount ${gone.name}`,
      rest: { ...cooler, mounts: mounts.filter((mount) => mount !== gone) },
    }));
  return runsOf(cooler).map((gone) => ({
    left: `${cooler.name}, run ${gone.name}`,
    rest: {
      ...cooler,
      mounts: mounts.map((mount) => ({ ...mount, runs: mount.runs.filter((run) => run !== gone) })),
    },
  }));
}

/** A side without one of its units, from its mean and variance; right to rounding, which is all that a flag needs. */
function lessOneValue({ mean, variance, values }: Evidence, value: number): Side {
  const n = values.length;
  const squares = (n - 1) * variance - (n / (n - 1)) * (value - mean) ** 2;
  return { mean: (n * mean - value) / (n - 1), variance: Math.max(0, squares) / (n - 2), units: n - 1 };
}

/** Above so many units recounting each is too slow, and differs from the short way in no flag. */
const MOST_RECOUNTED = 60;

/** Each cooler that is left when one unit is taken out. */
function eachLessOne(
  cooler: JudgedCooler,
  evidence: Evidence,
): { readonly left: string; readonly rest: Side }[] {
  if (evidence.unit === 'run' && evidence.values.length > MOST_RECOUNTED)
    return evidence.values.map((value, index) => ({
      left: `${cooler.name}, run ${evidence.unitNames[index]}`,
      rest: lessOneValue(evidence, value),
    }));
  const evidenceOf = evidence.unit === 'mount' ? mountEvidence : runEvidence;
  return lessOne(cooler, evidence.unit).map(({ left, rest }) => ({ left, rest: side(evidenceOf(rest)) }));
}

/** Which single units, left out, would change the flag. Null when too few would be left to judge. */
export function leaveOneOut(
  a: JudgedCooler,
  b: JudgedCooler,
  unit: UnitOfEvidence,
  options: WelchOptions,
  outside: boolean,
): PairResult['leaveOneOut'] {
  const evidenceOf = unit === 'mount' ? mountEvidence : runEvidence;
  const fewestLeft = unit === 'mount' ? 2 : 3;
  const [first, second] = [evidenceOf(a), evidenceOf(b)];
  const which: string[] = [];
  let tried = 0;
  const tryWithout = (left: string, x: Side, y: Side): void => {
    const result = welch(x, y, {
      ...options,
      degreesOfFreedomCap: degreesOfFreedomCap(unit, Math.min(x.units, y.units)),
    });
    tried++;
    if (result && isOutside(result) !== outside) which.push(left);
  };
  if (first.values.length > fewestLeft)
    for (const { left, rest } of eachLessOne(a, first)) tryWithout(left, rest, side(second));
  if (second.values.length > fewestLeft)
    for (const { left, rest } of eachLessOne(b, second)) tryWithout(left, side(first), rest);
  return tried === 0 ? null : { unit, units: tried, tips: which.length, which };
}
