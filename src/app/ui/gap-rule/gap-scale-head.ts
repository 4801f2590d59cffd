import { ChangeDetectionStrategy, Component, computed, input } from '@angular/core';
import { Unit } from '../quantity/quantity-format';
import { drawnWidth } from './drawn-width';
import { scaleOver } from './gap-scale';
import { SMALL_PADDING } from './small-gap-rule-drawing';
import { SMALL_TICKS, ticks } from './ticks';

/** The numerals over a column of small gap rules: −2 −1 0 +1 +2. */
@Component({
  selector: 'tm-gap-scale-head',
  template: `
    <svg aria-hidden="true" [attr.width]="width()" height="20">
      @for (numeral of numerals(); track numeral.text) {
        <text [attr.x]="numeral.x" y="12" text-anchor="middle">{{ numeral.text }}</text>
      }
    </svg>
  `,
  styles: `
    :host,
    svg {
      display: block;
      min-width: 0;
      overflow: visible;
    }
    text {
      fill: var(--ink-2);
      font-family: inherit;
      font-size: 12px;
    }
  `,
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class GapScaleHead {
  /** As given to the small rules below. */
  readonly domain = input.required<number>();
  readonly unit = input<Unit>('°C');

  private readonly drawn = drawnWidth(420, null);
  protected readonly width = computed(() => Math.min(this.drawn.width(), 460));
  protected readonly numerals = computed(() => {
    const whole = 10 ** Math.floor(Math.log10(this.domain()) + 1e-9);
    const scale = scaleOver(this.domain(), whole, this.width(), SMALL_PADDING);
    return ticks(scale, 0, SMALL_TICKS, 1).numerals.filter(({ half }) => !half);
  });
}
