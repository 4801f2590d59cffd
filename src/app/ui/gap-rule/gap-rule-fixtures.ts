import { GapRulePair } from './gap-rule-pair';

/** The invented fin pair of the design, outside noise by a little, and the other states beside it. */
export const FIN_PAIR: GapRulePair = {
  a: 'Coated fins',
  b: 'Bare fins',
  unit: '°C',
  gap: -0.626,
  marginOfError: 0.6027,
  interval: [-1.2287, -0.0233],
  gapThatMatters: 0.5,
  confidence: 0.95,
  flag: 'outside noise',
  sizeCall: 'size open',
  notJudgedCode: null,
};
