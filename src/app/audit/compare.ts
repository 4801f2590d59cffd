import { ChangeDetectionStrategy, Component, computed, input } from '@angular/core';
import { PairRow, ReRun, VerdictRow } from '../../../shared/contracts/verdicts';
import { sharedDomain, SmallGapRule } from '../ui/gap-rule';
import {
  decimalsForGap,
  formatPlusMinus,
  formatRatio,
  formatSigned,
  NO_VALUE,
} from '../ui/quantity/quantity-format';
import { ReRunResult } from '../verdicts/re-run-result';
import { pairAsReRun } from './audit-row';

/** A verdict as stored beside the same verdict re-run: what a reader sees first, then every field that differs. */
@Component({
  selector: 'tm-compare',
  imports: [ReRunResult, SmallGapRule],
  templateUrl: './compare.html',
  styleUrl: './compare.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class Compare {
  readonly verdict = input.required<VerdictRow>();
  readonly reRun = input.required<ReRun>();

  protected readonly stored = computed(() => this.verdict().pairs[0]);
  protected readonly again = computed(() => pairAsReRun(this.stored(), this.reRun()));
  protected readonly domain = computed(() =>
    sharedDomain([this.stored(), this.again()], this.verdict().unit),
  );
  protected readonly figures = computed(() => {
    const { unit } = this.verdict();
    const [stored, again] = [this.stored(), this.again()];
    const decimals = Math.max(
      decimalsForGap(stored.gap, stored.marginOfError, unit),
      decimalsForGap(again.gap, again.marginOfError, unit),
    );
    const shown = (value: number | null, write: (value: number) => string): string =>
      value === null ? NO_VALUE : write(value);
    const row = (name: string, of: (pair: PairRow) => string) => {
      const [before, after] = [of(stored), of(again)];
      return { name, before, after, same: before === after };
    };
    return [
      row(`gap, ${unit}`, ({ gap }) => shown(gap, (value) => formatSigned(value, decimals))),
      row(`margin of error, ${unit}`, ({ marginOfError }) =>
        shown(marginOfError, (value) => formatPlusMinus(value, decimals)),
      ),
      row('gap ÷ margin', ({ clearance }) => shown(clearance, formatRatio)),
      row('verdict', ({ headline }) => headline),
    ];
  });
}
