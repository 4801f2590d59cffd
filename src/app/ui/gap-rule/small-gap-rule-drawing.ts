import { PairRow } from '../../../../shared/contracts';
import { decimalsFor, formatSigned, Unit, withUnit } from '../quantity/quantity-format';
import { Label } from './gap-rule-drawing';
import { needleShape } from './gap-rule-pair';
import { GapScale, scaleOver } from './gap-scale';
import { NeedlePaths, needlePaths } from './needle';
import { round, SMALL_TICKS, snap, ticks } from './ticks';

/** A small rule as paths, CSS px. Marks that reach beyond the domain end at the rule's end, open. */
export interface SmallGapRuleDrawing {
  readonly width: number;
  readonly height: number;
  /** Drawn through the gaps between a list's rows. */
  readonly zero: string;
  readonly zeroInside: string;
  readonly edge: string;
  readonly ticks: string;
  readonly notches: readonly { readonly fill: string; readonly line: string }[];
  readonly band: { readonly x: number; readonly width: number } | null;
  readonly bandEnds: string;
  readonly bracket: { readonly path: string; readonly dashed: boolean } | null;
  readonly needle: ({ readonly x: number } & NeedlePaths) | null;
  /** The value of a gap beyond the domain, beside the mark that says so. */
  readonly beyond: Label | null;
}

export const SMALL_PADDING = 4;
export const SMALL_BAND = { top: 12, height: 9 } as const;
const HEIGHT = 30;
const EDGE = 21;
const ZERO = { from: -14, to: 44 };
const BRACKET = { y: 4, feet: 8 };
const NEEDLE = { top: 1, halfWidth: 3.2 };
const NOTCH = { halfWidth: 3, depth: 6 };

/** @param domain half-width of the list's shared domain, in the unit */
export function drawSmallGapRule(
  pair: PairRow,
  domain: number,
  unit: Unit,
  frame: { readonly width: number; readonly pixelRatio: number },
): SmallGapRuleDrawing {
  const scale = scaleOver(domain, 10 ** Math.floor(Math.log10(domain) + 1e-9), frame.width, SMALL_PADDING);
  const drawnTicks = ticks(scale, EDGE, SMALL_TICKS, frame.pixelRatio);
  const zeroX = round(snap(scale.x(0), 1, frame.pixelRatio));
  const margin = pair.marginOfError !== null && pair.marginOfError > 0 ? pair.marginOfError : null;
  const judged = pair.flag !== 'not judged';
  const band = margin === null ? null : spanOf(scale, -margin, margin);
  const bracket =
    margin === null || pair.gap === null || !judged
      ? null
      : spanOf(scale, pair.gap - margin, pair.gap + margin);
  return {
    width: frame.width,
    height: HEIGHT,
    zero: `M${zeroX} ${ZERO.from}V${ZERO.to}`,
    zeroInside: `M${zeroX} 0V${EDGE}`,
    edge: `M${SMALL_PADDING} ${EDGE}H${frame.width - SMALL_PADDING}`,
    ticks: drawnTicks.short + drawnTicks.mid + drawnTicks.long,
    notches: [-pair.gapThatMatters, pair.gapThatMatters]
      .filter((value) => Math.abs(value) <= domain)
      .map((value) => notchAt(round(scale.x(value)))),
    band: band && { x: band.left, width: round(band.right - band.left) },
    bandEnds: band ? ends(band, SMALL_BAND.top, EDGE) : '',
    bracket: bracket && {
      path: bracketPath(bracket),
      dashed: pair.flag === 'within noise' && pair.sizeCall === 'size open',
    },
    needle:
      pair.gap === null
        ? null
        : {
            x: round(scale.x(Math.max(-domain, Math.min(domain, pair.gap)))),
            ...needlePaths(needleShape(pair), NEEDLE.top, EDGE, NEEDLE.halfWidth),
          },
    beyond:
      pair.gap !== null && Math.abs(pair.gap) > domain ? beyondLabel(pair.gap, unit, frame.width) : null,
  };
}

interface Span {
  readonly left: number;
  readonly right: number;
  /** Whether the end lies inside the domain and is closed. */
  readonly closed: readonly [boolean, boolean];
}

/** The part of low…high that the domain shows; null when none of it. */
function spanOf(scale: GapScale, low: number, high: number): Span | null {
  const [from, to] = [Math.max(low, -scale.reach), Math.min(high, scale.reach)];
  if (from >= to) return null;
  return { left: round(scale.x(from)), right: round(scale.x(to)), closed: [from === low, to === high] };
}

function ends({ left, right, closed }: Span, from: number, to: number): string {
  return (closed[0] ? `M${left} ${from}V${to}` : '') + (closed[1] ? `M${right} ${from}V${to}` : '');
}

function bracketPath({ left, right, closed }: Span): string {
  const start = closed[0] ? `M${left} ${BRACKET.feet}V${BRACKET.y}` : `M${left} ${BRACKET.y}`;
  return `${start}H${right}${closed[1] ? `V${BRACKET.feet}` : ''}`;
}

function notchAt(x: number): { fill: string; line: string } {
  const [left, right, top] = [x - NOTCH.halfWidth, x + NOTCH.halfWidth, EDGE - NOTCH.depth].map(round);
  return {
    fill: `M${left} ${top}L${x} ${EDGE}L${right} ${top}Z`,
    line: `M${left} ${top}L${x} ${EDGE - 0.5}L${right} ${top}`,
  };
}

function beyondLabel(gap: number, unit: Unit, width: number): Label {
  const value = withUnit(formatSigned(gap, decimalsFor(null, unit)), unit);
  const right = gap > 0;
  return {
    x: right ? width - SMALL_PADDING - 8 : SMALL_PADDING + 8,
    y: 11,
    anchor: right ? 'end' : 'start',
    text: right ? `${value} »` : `« ${value}`,
  };
}
