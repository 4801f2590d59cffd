import {
  booleanAttribute,
  ChangeDetectionStrategy,
  Component,
  computed,
  effect,
  input,
  signal,
} from '@angular/core';
import { Unit } from '../quantity/quantity-format';
import { drawnWidth } from './drawn-width';
import { drawGapRule, GapRuleSubject } from './gap-rule-drawing';
import { GapRulePair } from './gap-rule-pair';
import { keyRows, ruleDescription } from './gap-rule-words';
import { WIDE_FROM } from './gap-scale';
import { KeyMark } from './key-mark';

let rulesMade = 0;

/** How long the needle takes to a new place, ms; a little over the transition in the style sheet. */
const NEEDLE_MOVES = 260;

/**
 * The gap rule: a verdict as a position on a scale. Headline and second line are projected; with `flag` they
 * fly from a pole on the needle where the rule is wide. Without a `pair` the rule is unmarked.
 */
@Component({
  selector: 'tm-gap-rule',
  imports: [KeyMark],
  templateUrl: './gap-rule.html',
  styleUrl: './gap-rule.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class GapRule {
  /** The pair to show; null shows the rule without a needle. */
  readonly pair = input<GapRulePair | null>(null);
  /** Unit of the unmarked rule; a pair brings its own. */
  readonly unit = input<Unit>('°C');
  /** Where the notches of the unmarked rule stand, in the unit. */
  readonly gapThatMatters = input<number | null>(null);
  /** What the picture is called: the verdict's headline. */
  readonly name = input('Gap rule');
  /** Whether the projected headline flies from the needle where there is room. */
  readonly flag = input(false, { transform: booleanAttribute });

  protected readonly id = `gap-rule-${++rulesMade}`;
  protected readonly moving = signal(false);
  private readonly drawn = drawnWidth(WIDE_FROM);

  private readonly subject = computed<GapRuleSubject>(() => ({
    pair: this.pair(),
    unit: this.pair()?.unit ?? this.unit(),
    gapThatMatters: this.gapThatMatters(),
  }));
  protected readonly drawing = computed(() => {
    const width = this.drawn.width();
    const onPaper = this.drawn.onPaper();
    return drawGapRule(this.subject(), {
      width,
      pixelRatio: onPaper ? 1 : (globalThis.devicePixelRatio ?? 1),
      flag: this.flag() && !onPaper && width >= WIDE_FROM,
    });
  });
  protected readonly key = computed(() => keyRows(this.subject(), this.drawing().ticks.worth));
  protected readonly description = computed(() => ruleDescription(this.subject()));

  private lastGap: number | null | undefined;

  constructor() {
    // The needle glides only when its gap changes, never when the rule is drawn at another width.
    effect((onCleanup) => {
      const gap = this.pair()?.gap ?? null;
      const moved = this.lastGap !== undefined && this.lastGap !== gap;
      this.lastGap = gap;
      if (!moved) return;
      this.moving.set(true);
      const settled = setTimeout(() => this.moving.set(false), NEEDLE_MOVES);
      onCleanup(() => clearTimeout(settled));
    });
  }
}
