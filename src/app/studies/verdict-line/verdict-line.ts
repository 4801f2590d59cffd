import { ChangeDetectionStrategy, Component, computed, input } from '@angular/core';
import { RouterLink } from '@angular/router';
import { VerdictRow } from '../../../../shared/contracts/verdicts';
import { NeedleMark, needleShape, SmallGapRule } from '../../ui/gap-rule';
import { MomentPipe } from '../../ui/moment/moment-pipe';
import { decimalsForGap, formatNumber, formatRatio, withUnit } from '../../ui/quantity/quantity-format';
import { Domains } from './domains';

const STATE_WORDS: Record<VerdictRow['state'], string> = {
  judged: 'not submitted',
  submitted: 'submitted',
  'sent back': 'sent back',
  'signed off': 'signed off',
  withdrawn: 'withdrawn',
};

/** One verdict as a row of a list: what it is about, its small gap rule, its words, its state and the way in. */
@Component({
  selector: 'tm-verdict-line',
  changeDetection: ChangeDetectionStrategy.OnPush,
  imports: [RouterLink, SmallGapRule, NeedleMark, MomentPipe],
  templateUrl: './verdict-line.html',
  styleUrl: './verdict-line.scss',
})
export class VerdictLine {
  readonly verdict = input.required<VerdictRow>();
  readonly domains = input.required<Domains>();
  /** Words of the button that opens the verdict. */
  readonly act = input('Open');
  /** Whether opening it is the main thing to do in this row. */
  readonly main = input(false);
  /** Whether the row names the study; a study's own page does not repeat it. */
  readonly named = input(true);
  readonly note = input<string | null>(null);

  protected readonly about = computed(() => {
    const { condition, unit } = this.verdict();
    const what = unit === '°C' ? 'rise' : 'resistance';
    return `${condition.name}${condition.nominalWatts ? `, ${withUnit(String(condition.nominalWatts), 'W')}` : ''}, ${what}`;
  });

  protected readonly lines = computed(() =>
    this.verdict().pairs.map((pair) => {
      const unit = this.verdict().unit;
      const clearance = pair.clearance === null ? null : formatRatio(pair.clearance);
      const side =
        pair.gap === null
          ? null
          : `${pair.a} ${withUnit(formatNumber(Math.abs(pair.gap), decimalsForGap(pair.gap, pair.marginOfError, unit)), unit)} ${pair.gap < 0 ? 'lower' : 'higher'} than ${pair.b}`;
      return {
        pair,
        shape: needleShape(pair),
        detail: [clearance, side].filter((part) => part !== null).join(', '),
      };
    }),
  );

  protected readonly weight = computed(() => {
    const { cautions, stops } = this.verdict();
    const parts = [];
    if (stops > 0) parts.push(stops === 1 ? '1 check blocks sign-off' : `${stops} checks block sign-off`);
    if (cautions > 0) parts.push(cautions === 1 ? '1 check weakens it' : `${cautions} checks weaken it`);
    return parts.join('; ');
  });

  protected readonly state = computed(() => STATE_WORDS[this.verdict().state]);
}
