import { Finding } from '../../contracts/judgement';
import { ambient, fan, heatLoad, sensor, settling } from './condition-checks';
import {
  detectableGap,
  fewUnits,
  mounts,
  noCall,
  singleUnits,
  unequalNumbers,
  unequalSpread,
} from './evidence-checks';
import { CheckedPair, PairCheck } from './finding';
import { evidenceNeeded, secondOpinion, severalPairs, shortHistory, standOut } from './opinion-checks';
import { orderAndDrift } from './order-checks';

/** Checks in the order they are told among findings of the same weight. */
const CHECKS: readonly PairCheck[] = [
  noCall,
  fewUnits,
  singleUnits,
  secondOpinion,
  standOut,
  detectableGap,
  evidenceNeeded,
  mounts,
  shortHistory,
  orderAndDrift,
  heatLoad,
  ambient,
  fan,
  settling,
  sensor,
  unequalSpread,
  unequalNumbers,
  severalPairs,
];

const WEIGHT: Record<Finding['level'], number> = { stop: 0, caution: 1, note: 2 };

/** All findings of a pair. */
export const findingsOf = (checked: CheckedPair): Finding[] => CHECKS.flatMap((check) => check(checked));

/** Worst first; within a weight in the order told. */
export const worstFirst = (findings: readonly Finding[]): Finding[] =>
  [...findings].sort((a, b) => WEIGHT[a.level] - WEIGHT[b.level]);
