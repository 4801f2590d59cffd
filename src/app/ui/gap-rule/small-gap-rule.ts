import { booleanAttribute, ChangeDetectionStrategy, Component, computed, input } from '@angular/core';
import { PairRow } from '../../../../shared/contracts';
import { Unit } from '../quantity/quantity-format';
import { drawnWidth } from './drawn-width';
import { smallRuleLabel } from './gap-rule-words';
import { drawSmallGapRule } from './small-gap-rule-drawing';

let rulesMade = 0;

/** One verdict of a list as a thin rule; all rows of the list share one domain and so one zero line. */
@Component({
  selector: 'tm-small-gap-rule',
  templateUrl: './small-gap-rule.html',
  styleUrl: './small-gap-rule.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class SmallGapRule {
  readonly pair = input.required<PairRow>();
  /** Half-width of the list's domain, in the unit: `sharedDomain(pairs, unit)`. */
  readonly domain = input.required<number>();
  readonly unit = input<Unit>('°C');

  /** Whether the rule stands by itself: its zero line then stays inside, for no row continues it. */
  readonly alone = input(false, { transform: booleanAttribute });

  protected readonly id = `small-rule-${++rulesMade}`;
  private readonly drawn = drawnWidth(420, null);
  protected readonly rule = computed(() =>
    drawSmallGapRule(this.pair(), this.domain(), this.unit(), {
      width: Math.min(this.drawn.width(), WIDEST),
      pixelRatio: globalThis.devicePixelRatio ?? 1,
    }),
  );
  protected readonly label = computed(() => smallRuleLabel(this.pair(), this.unit()));
}

/** A list's rules never grow beyond this, px. */
const WIDEST = 460;
