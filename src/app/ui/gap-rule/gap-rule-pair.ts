import { Flag, SizeCall } from '../../../../shared/contracts';
import { Unit } from '../quantity/quantity-format';

/** What the gap rule needs of a pair; gap is a's mean minus b's, all numbers in `unit`. */
export interface GapRulePair {
  readonly a: string;
  readonly b: string;
  readonly unit: Unit;
  readonly gap: number | null;
  readonly marginOfError: number | null;
  readonly interval: readonly [number, number] | null;
  readonly gapThatMatters: number;
  readonly confidence: number;
  readonly flag: Flag;
  readonly sizeCall: SizeCall;
  readonly notJudgedCode: string | null;
}

/** Shapes of the needle: which verdict it is, told without colour. */
export type NeedleShape = 'solid' | 'half' | 'hollow' | 'broken' | 'ring' | 'open V';

type Call = Pick<GapRulePair, 'flag' | 'sizeCall' | 'notJudgedCode'>;

/** The needle that stands for a call; the table of states in the design decides. */
export function needleShape(call: Call): NeedleShape {
  switch (call.flag) {
    case 'outside noise':
      return call.sizeCall === 'too small to matter' ? 'half' : 'solid';
    case 'within noise':
      return call.sizeCall === 'too small to matter' ? 'hollow' : 'broken';
    case 'not judged':
      return call.notJudgedCode === 'no spread measured' ? 'open V' : 'ring';
  }
}
