import { ChangeDetectionStrategy, Component, computed, input, signal } from '@angular/core';
import { CoolerResult, PairResult, Verdict } from '../../../shared/contracts';
import {
  decimalsForGap,
  formatInterval,
  formatLevel,
  formatPlusMinus,
  formatRatio,
  formatSigned,
  MINUS,
  NO_VALUE,
} from '../ui/quantity/quantity-format';
import { IntervalPipe, QuantityPipe } from '../ui/quantity/quantity-pipes';

interface FullRow {
  readonly name: string;
  readonly value: string;
}

/** Means, spreads and intervals; all digits on demand; and what counting runs alone would have said. */
@Component({
  selector: 'tm-numbers',
  imports: [QuantityPipe, IntervalPipe],
  templateUrl: './numbers.html',
  styleUrl: './numbers.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class Numbers {
  readonly verdict = input.required<Verdict>();
  readonly pair = input.required<PairResult>();

  protected readonly full = signal(false);
  protected readonly unit = computed(() => this.verdict().unit);
  protected readonly meanUnit = computed(() => (this.unit() === '°C' ? '°C over ambient' : 'K/W'));
  protected readonly level = computed(() => formatLevel(this.pair().confidence));

  /** Reference first, as in the chart. */
  protected readonly rows = computed(() => {
    const { a, b } = this.pair();
    const place = ({ name }: CoolerResult): number => (name === b ? 0 : name === a ? 1 : 2);
    return [...this.verdict().judgement.coolers].sort((one, other) => place(one) - place(other));
  });
  protected readonly two = computed(() =>
    this.rows().filter(({ name }) => name === this.pair().a || name === this.pair().b),
  );
  protected readonly decimals = computed(() =>
    decimalsForGap(this.pair().gap, this.pair().marginOfError, this.unit()),
  );
  protected readonly gap = computed(() => {
    const { gap, interval } = this.pair();
    return {
      gap: gap === null ? NO_VALUE : formatSigned(gap, this.decimals()),
      interval: interval === null ? NO_VALUE : formatInterval(interval, this.decimals()),
    };
  });
  protected readonly truncated = computed(() => this.rows().some((row) => row.spreadBetweenMountsTruncated));
  protected readonly mountsUnknown = computed(() => this.rows().some(({ mounts }) => mounts === null));

  protected readonly naive = computed(() => {
    const { naive, scope } = this.pair();
    if (naive === null || scope !== 'mounts') return null;
    const decimals = decimalsForGap(naive.gap, naive.marginOfError, this.unit());
    const clearance = Math.abs(naive.gap) / naive.marginOfError;
    const runs = this.two().reduce((sum, row) => sum + row.runs, 0);
    return {
      runs,
      margin: formatPlusMinus(naive.marginOfError, decimals),
      ratio: formatRatio(clearance),
      outside: clearance > 1,
    };
  });

  protected readonly fullRows = computed<FullRow[]>(() => {
    const pair = this.pair();
    const unit = this.unit();
    const rows: [string, number | null | undefined, string][] = [
      ['gap', pair.gap, unit],
      ['standard error', pair.standardError, unit],
      ['degrees of freedom', pair.degreesOfFreedom, ''],
      ['t', pair.statistic, ''],
      [`margin of error at ${this.level()}`, pair.marginOfError, unit],
      ['interval, lower end', pair.interval?.[0], unit],
      ['interval, upper end', pair.interval?.[1], unit],
      ['gap ÷ margin', pair.clearance, ''],
      ['p, no gap', pair.p, ''],
      ['p, gap at least what matters (both one-sided tests)', pair.equivalence?.p, ''],
      ['smallest gap this study can see', pair.smallestVisibleGap, unit],
      ['chance to find the gap that matters', pair.powerAtGapThatMatters, ''],
      ['gap that matters', pair.gapThatMatters, unit],
      ['remounting SD at which the call would tip', pair.tippingMountSpread, unit],
    ];
    return rows
      .filter(([, value]) => value !== null && value !== undefined)
      .map(([name, value, of]) => ({ name, value: `${allDigits(value as number)}${of ? ` ${of}` : ''}` }));
  });

  protected all(value: number | null): string {
    return value === null ? NO_VALUE : allDigits(value);
  }

  protected toggleFull(): void {
    this.full.update((shown) => !shown);
  }
}

/** The shortest digits that give the same number back, with a true minus. */
function allDigits(value: number): string {
  return String(value).replace(/^-/, MINUS).replace('e-', `e${MINUS}`);
}
