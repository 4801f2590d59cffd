import { ChangeDetectionStrategy, Component, computed, input } from '@angular/core';
import { PairResult, Verdict, VerdictWords } from '../../../shared/contracts';
import { decimalsFor, formatNumber, withUnit } from '../ui/quantity/quantity-format';
import { scopeInWords } from './verdict-words';

/** How far the verdict reaches, what it leaves open, and the cautions of the bench. */
@Component({
  selector: 'tm-scope-notes',
  template: `
    <h2 class="section-head">What this verdict covers</h2>
    <p>{{ covers() }}</p>
    @if (tipping(); as sentence) {
      <p>{{ sentence }}</p>
    }
    @if (words().doesNotCover.length > 0) {
      <h3>It does not cover</h3>
      <ul>
        @for (line of words().doesNotCover; track line) {
          <li>{{ line }}</li>
        }
      </ul>
    }
    <h3>On the bench</h3>
    <ul>
      <li>Heat sources, plates and coolers stay hot after a run.</li>
      <li>Mains power, spinning fans and coolant can injure; make the bench safe before touching it.</li>
      <li>The makers’ ratings and the local rules come first; nothing here overrides them.</li>
    </ul>
  `,
  styleUrl: './scope-notes.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class ScopeNotes {
  readonly verdict = input.required<Verdict>();
  readonly pair = input.required<PairResult>();
  readonly words = input.required<VerdictWords>();

  protected readonly covers = computed(() => scopeInWords(this.pair()));
  protected readonly tipping = computed(() => {
    const { tippingMountSpread } = this.pair();
    if (tippingMountSpread === null) return null;
    const { unit } = this.verdict();
    const spread = withUnit(formatNumber(tippingMountSpread, decimalsFor(tippingMountSpread, unit)), unit);
    return `If remounting moves a reading by ${spread} (SD) or more, the gap is no longer outside noise.`;
  });
}
