import { BenchHistory, PairResult, StatedUncertainty } from '../contracts/judgement';
import { Evidence } from './evidence';
import type { Reason, Rules } from './judge-pair';
import { WelchOptions, WelchResult } from './welch';

/** What one pair is judged by beside its own runs. */
export interface PairSetting {
  readonly rules: Rules;
  readonly bench: BenchHistory | null;
  readonly uncertainties: readonly StatedUncertainty[];
  readonly seed: number;
}

/** What a pair is judged on: whose spread is the noise, and the test's result. */
export interface Ground {
  readonly basis: NonNullable<PairResult['basis']>;
  readonly evidence: readonly [Evidence, Evidence];
  readonly result: WelchResult | null;
  readonly options: WelchOptions;
  readonly lacking: Reason | null;
}
