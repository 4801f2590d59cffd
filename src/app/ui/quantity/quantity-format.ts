/** The formats of the engine's own sentences, so that a figure reads the same in a sentence and in a table. */
export {
  decimalsFor,
  decimalsForGap,
  formatInterval,
  formatLevel,
  formatNumber,
  formatPlusMinus,
  formatRatio,
  formatSigned,
  MINUS,
  NO_BREAK_SPACE,
  NO_VALUE,
  withUnit,
} from '../../../../shared/judgement/quantity-format';
export type { Unit } from '../../../../shared/judgement/quantity-format';
