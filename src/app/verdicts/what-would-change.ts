import { ChangeDetectionStrategy, Component, computed, input } from '@angular/core';
import { PairResult, Verdict } from '../../../shared/contracts';
import {
  decimalsFor,
  decimalsForGap,
  formatNumber,
  formatPlusMinus,
  formatRatio,
  withUnit,
} from '../ui/quantity/quantity-format';
import { oftenInWords, plural } from './verdict-words';

/** What more evidence would give, the smallest gap this evidence finds, and how much hangs on a single unit. */
@Component({
  selector: 'tm-what-would-change',
  templateUrl: './what-would-change.html',
  styleUrl: './what-would-change.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class WhatWouldChange {
  readonly verdict = input.required<Verdict>();
  readonly pair = input.required<PairResult>();

  protected readonly unit = computed(() => this.verdict().unit);
  /** As many as the gap itself is given with. */
  private readonly decimals = computed(() =>
    decimalsForGap(this.pair().gap, this.pair().marginOfError, this.unit()),
  );
  protected readonly rows = computed(() => {
    const { more } = this.pair();
    return more.map((row, index) => ({
      who: [row.mounts === null ? null : plural(row.mounts, 'mount'), plural(row.runs, 'run')]
        .filter((words) => words !== null)
        .join(', '),
      now: index === 0,
      added: index === 0 ? '' : `+${2 * (row.runs - more[0].runs)}`,
      margin: formatPlusMinus(row.marginOfError, this.decimals()),
      ratio: formatRatio(row.clearance),
    }));
  });

  protected readonly visible = computed(() => {
    const { smallestVisibleGap, gapThatMatters } = this.pair();
    if (smallestVisibleGap === null) return null;
    const seen = withUnit(formatNumber(smallestVisibleGap, this.decimals()), this.unit());
    const matters = withUnit(formatNumber(gapThatMatters, decimalsFor(null, this.unit())), this.unit());
    const often = oftenInWords(this.verdict().thresholds.values.power);
    const enough = smallestVisibleGap <= gapThatMatters;
    return (
      `Evidence like this finds a gap of ${seen} ${often}` +
      (enough
        ? `, so a gap of ${matters}, the smallest that matters, is seldom missed.`
        : `; a gap of ${matters}, the smallest that matters, is found less often.`)
    );
  });

  protected readonly leaveOneOut = computed(() => {
    const { leaveOneOut } = this.pair();
    if (leaveOneOut === null) return null;
    const { unit, units, tips, which } = leaveOneOut;
    if (tips === 0) return `Leaving out any single ${unit} of the ${units} keeps the call.`;
    const named = which.length > 0 ? `: ${which.join('; ')}` : '';
    return `Leaving out any one of ${tips} of the ${units} ${unit}s would change the call${named}.`;
  });
}
