import { CoolerResult, Finding, JudgedCooler, JudgementInput, PairResult } from '../../contracts/judgement';
import { FindingLevel } from '../../contracts/run-summary';
import { Rules } from '../judge-pair';
import { decimalsFor, formatNumber, formatSigned, Unit, withUnit } from '../quantity-format';

/** What a check may look at. */
export interface CheckedPair {
  readonly pair: PairResult;
  readonly a: JudgedCooler;
  readonly b: JudgedCooler;
  readonly resultA: CoolerResult;
  readonly resultB: CoolerResult;
  readonly input: JudgementInput;
  readonly rules: Rules;
  readonly unit: Unit;
}

/** One check of a pair; none, one or several findings. */
export type PairCheck = (checked: CheckedPair) => Finding[];

export const finding = (
  code: string,
  level: FindingLevel,
  title: string,
  text: string,
  numbers: Finding['numbers'] = {},
): Finding => ({ code, level, title, text, numbers });

/** A number of the metric's unit for a sentence: two decimals of °C, four of K/W, one more than the noise supports. */
export const quantity = (value: number, { unit, pair }: CheckedPair): string =>
  withUnit(formatNumber(value, decimalsFor(pair.marginOfError, unit)), unit);

export const signed = (value: number, { unit, pair }: CheckedPair, moreDecimals = 0): string =>
  withUnit(formatSigned(value, decimalsFor(pair.marginOfError, unit) + moreDecimals), unit);

export const degrees = (value: number, decimals = 1): string => withUnit(formatNumber(value, decimals), '°C');
export const watts = (value: number, decimals = 1): string => withUnit(formatNumber(value, decimals), 'W');

/** "B4 run 1, B5 run 1 and 3 more". */
export function listed(names: readonly string[], most = 4): string {
  if (names.length <= most)
    return names.length < 2 ? names.join('') : `${names.slice(0, -1).join(', ')} and ${names.at(-1)}`;
  return `${names.slice(0, most).join(', ')} and ${names.length - most} more`;
}
