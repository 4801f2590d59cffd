import { formatSigned, decimalsForGap } from '../quantity/quantity-format';
import { GapRulePair, needleShape, NeedleShape } from './gap-rule-pair';
import { GapScale, gapScale, PADDING, WIDE_FROM } from './gap-scale';
import { needlePaths, NeedlePaths } from './needle';
import { BIG_TICKS, round, snap, Ticks, ticks } from './ticks';

/** A word on the drawing. `halo` words may cross other marks and carry a ground-coloured outline. */
export interface Label {
  readonly x: number;
  readonly y: number;
  readonly anchor: 'start' | 'middle' | 'end';
  readonly text: string;
}

/** The big rule as paths in CSS pixels, drawn at `width` and never scaled. */
export interface GapRuleDrawing {
  readonly width: number;
  readonly height: number;
  readonly edge: string;
  readonly ticks: Ticks;
  readonly numeralY: { readonly whole: number; readonly half: number };
  readonly zero: string;
  readonly notches: readonly { readonly fill: string; readonly line: string }[];
  readonly band: {
    readonly x: number;
    readonly y: number;
    readonly width: number;
    readonly height: number;
  } | null;
  readonly bandEnds: string;
  readonly bracket: { readonly path: string; readonly dashed: boolean } | null;
  readonly bracketEnds: readonly Label[];
  readonly needle: ({ readonly x: number; readonly shape: NeedleShape } & NeedlePaths) | null;
  /** Where the flag's pole stands, px from the left, and on which side of it the headline goes. */
  readonly pole: { readonly x: number; readonly path: string; readonly textSide: 'left' | 'right' } | null;
  readonly sides: readonly Label[];
  readonly noNoise: Label | null;
}

/** What to draw. `pair` null leaves the rule unmarked: ticks, zero and notches only. */
export interface GapRuleSubject {
  readonly pair: GapRulePair | null;
  readonly unit: GapRulePair['unit'];
  readonly gapThatMatters: number | null;
}

export interface GapRuleFrame {
  readonly width: number;
  readonly pixelRatio: number;
  /** Whether a headline flies from a pole on the needle; only where the rule is wide. */
  readonly flag: boolean;
}

const HEIGHT = 128;
const EDGE = 80;
const POLE = 6;
const BAND_TOP = 46;
const ZERO_TOP = 40;
const BRACKET = { y: 20, feet: 9, label: 29, space: 7 };
const NEEDLE = { top: 10, halfWidth: 5 };
const NOTCH = { halfWidth: 5.5, depth: 12 };
const SIDE_Y = 52;
/** Names longer than this stand in the key line only. */
const LONGEST_SIDE_NAME = 28;

/** Lays out the rule; see the design's section on its geometry for the sizes. */
export function drawGapRule(subject: GapRuleSubject, frame: GapRuleFrame): GapRuleDrawing {
  const { pair, unit } = subject;
  const gap = pair?.gap ?? null;
  const matters = pair?.gapThatMatters ?? subject.gapThatMatters;
  const scale = gapScale(
    { gap, marginOfError: pair?.marginOfError ?? null, gapThatMatters: matters ?? 0 },
    unit,
    frame.width,
  );
  const gapX = gap === null ? null : round(scale.x(gap));
  const down = frame.flag && gapX !== null ? POLE : 0;
  const edgeY = EDGE + down;
  const zeroX = round(snap(scale.x(0), 1, frame.pixelRatio));
  const judged = pair !== null && pair.flag !== 'not judged';
  const band =
    pair && hasNoise(pair) ? bandAt(scale, pair.marginOfError ?? 0, BAND_TOP + down, EDGE - BAND_TOP) : null;
  const noNoise = pair && !hasNoise(pair) ? noNoiseLabel(gap ?? 0, zeroX, SIDE_Y + down) : null;

  return {
    width: frame.width,
    height: HEIGHT + down,
    edge: `M${PADDING} ${edgeY}H${round(frame.width - PADDING)}`,
    ticks: ticks(scale, edgeY, BIG_TICKS, frame.pixelRatio),
    numeralY: { whole: edgeY + 38, half: edgeY + 27 },
    zero: `M${zeroX} ${ZERO_TOP + down}V${edgeY}`,
    notches:
      matters === null ? [] : [-matters, matters].map((value) => notchAt(round(scale.x(value)), edgeY)),
    band,
    bandEnds: band ? `M${band.x} ${band.y}V${edgeY}M${round(band.x + band.width)} ${band.y}V${edgeY}` : '',
    ...(judged ? bracketOf(pair, scale, down) : { bracket: null, bracketEnds: [] }),
    needle:
      pair && gapX !== null
        ? {
            x: gapX,
            shape: needleShape(pair),
            ...needlePaths(needleShape(pair), NEEDLE.top + down, edgeY, NEEDLE.halfWidth),
          }
        : null,
    pole: down && gapX !== null ? poleAt(gapX, frame.width) : null,
    sides: pair
      ? sideLabels(pair, frame.width, SIDE_Y + down).filter((side) => isClear(side, gapX, noNoise))
      : [],
    noNoise,
  };
}

function hasNoise(pair: GapRulePair): boolean {
  return pair.marginOfError !== null && pair.marginOfError > 0;
}

function bandAt(
  scale: GapScale,
  margin: number,
  y: number,
  height: number,
): NonNullable<GapRuleDrawing['band']> {
  const left = scale.x(-margin);
  return { x: round(left), y, width: round(scale.x(margin) - left), height };
}

function notchAt(x: number, edgeY: number): { fill: string; line: string } {
  const left = round(x - NOTCH.halfWidth);
  const right = round(x + NOTCH.halfWidth);
  const top = edgeY - NOTCH.depth;
  return {
    fill: `M${left} ${top}L${x} ${edgeY}L${right} ${top}Z`,
    line: `M${left} ${top}L${x} ${edgeY - 0.6}L${right} ${top}`,
  };
}

function poleAt(x: number, width: number): NonNullable<GapRuleDrawing['pole']> {
  return { x, path: `M${x} 0V${NEEDLE.top + POLE}`, textSide: x > width / 2 ? 'left' : 'right' };
}

function bracketOf(
  pair: GapRulePair,
  scale: GapScale,
  down: number,
): Pick<GapRuleDrawing, 'bracket' | 'bracketEnds'> {
  if (pair.interval === null) return { bracket: null, bracketEnds: [] };
  const [low, high] = pair.interval;
  const [left, right] = [round(scale.x(low)), round(scale.x(high))];
  const y = BRACKET.y + down;
  const feet = y + BRACKET.feet;
  const decimals = decimalsForGap(pair.gap, pair.marginOfError, pair.unit);
  const label = { y: BRACKET.label + down };
  return {
    bracket: {
      path: `M${left} ${feet}V${y}H${right}V${feet}`,
      dashed: pair.flag === 'within noise' && pair.sizeCall === 'size open',
    },
    bracketEnds: [
      { ...label, x: round(left - BRACKET.space), anchor: 'end', text: formatSigned(low, decimals) },
      { ...label, x: round(right + BRACKET.space), anchor: 'start', text: formatSigned(high, decimals) },
    ],
  };
}

function sideLabels(pair: GapRulePair, width: number, y: number): Label[] {
  const named = width >= WIDE_FROM - 2 * PADDING && pair.a.length <= LONGEST_SIDE_NAME ? `${pair.a} ` : '';
  return [
    { x: PADDING, y, anchor: 'start', text: `← ${named}lower` },
    { x: round(width - PADDING), y, anchor: 'end', text: `${named}higher →` },
  ];
}

/** Whether a side label stands clear of the needle and of the words on noise; the other side then says enough. */
function isClear(side: Label, needleX: number | null, noNoise: Label | null): boolean {
  const [from, to] = extentOf(side);
  const needle = needleX !== null && needleX > from - 8 && needleX < to + 8;
  const words = noNoise ? extentOf(noNoise) : null;
  return !needle && !(words && words[0] < to + 8 && words[1] > from - 8);
}

/** Left and right of a label set at 12 px; the figure width is generous. */
function extentOf({ x, anchor, text }: Label): [number, number] {
  const width = text.length * 6.5;
  return anchor === 'end' ? [x - width, x] : [x, x + width];
}

function noNoiseLabel(gap: number, zeroX: number, y: number): Label {
  const left = gap > 0;
  return { x: round(zeroX + (left ? -8 : 8)), y, anchor: left ? 'end' : 'start', text: 'noise not measured' };
}
