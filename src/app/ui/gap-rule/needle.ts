import { NeedleShape } from './gap-rule-pair';
import { round } from './ticks';

/** Paths of a needle standing at x = 0, to be moved to its gap. */
export interface NeedlePaths {
  /** Outlined in spirit, filled with the ground. */
  readonly hollow: readonly string[];
  /** Filled with spirit. */
  readonly solid: string | null;
  /** A dashed stem, for a gap that nothing judges. */
  readonly stem: string | null;
  readonly ring: { readonly y: number; readonly radius: number } | null;
}

/**
 * A spike from `top` down to its tip on the edge. The shape says which call it is:
 * solid, half solid, hollow, broken in two, a ring on the edge or an open V.
 */
export function needlePaths(shape: NeedleShape, top: number, tip: number, halfWidth: number): NeedlePaths {
  const spike = `M${-halfWidth} ${top}H${halfWidth}L0 ${tip}Z`;
  const none: NeedlePaths = { hollow: [], solid: null, stem: null, ring: null };
  switch (shape) {
    case 'solid':
      return { ...none, solid: spike };
    case 'half':
      return { ...none, hollow: [spike], solid: `M${-halfWidth} ${top}H0V${tip}Z` };
    case 'hollow':
      return { ...none, hollow: [spike] };
    case 'broken':
      return { ...none, hollow: brokenSpike(top, tip, halfWidth) };
    case 'open V':
      return { ...none, hollow: [`M${-halfWidth} ${top}L0 ${tip}L${halfWidth} ${top}`] };
    case 'ring': {
      const radius = round(halfWidth * 1.1);
      const y = round(tip - radius - 1.5);
      return { ...none, ring: { y, radius }, stem: `M0 ${top}V${round(y - radius - 0.5)}` };
    }
  }
}

/** Where the two pieces of a broken needle end and begin, as parts of its length. */
const BREAK = { from: 0.42, to: 0.62 } as const;

function brokenSpike(top: number, tip: number, halfWidth: number): string[] {
  const length = tip - top;
  const width = (part: number): number => round(halfWidth * (1 - part));
  const [upperEnd, lowerStart] = [round(top + BREAK.from * length), round(top + BREAK.to * length)];
  return [
    `M${-halfWidth} ${top}H${halfWidth}L${width(BREAK.from)} ${upperEnd}H${-width(BREAK.from)}Z`,
    `M${-width(BREAK.to)} ${lowerStart}H${width(BREAK.to)}L0 ${tip}Z`,
  ];
}
