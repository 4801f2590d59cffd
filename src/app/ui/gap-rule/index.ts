/** The gap rule and what lists need of it. */
export { GapRule } from './gap-rule';
export type { GapRulePair, NeedleShape } from './gap-rule-pair';
export { needleShape } from './gap-rule-pair';
export { GapScaleHead } from './gap-scale-head';
export { sharedDomain } from './gap-scale';
export { NeedleMark } from './needle-mark';
export { SmallGapRule } from './small-gap-rule';
