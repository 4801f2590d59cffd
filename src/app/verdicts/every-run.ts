import { ChangeDetectionStrategy, Component, computed, input } from '@angular/core';
import { PairResult, Verdict } from '../../../shared/contracts';
import { FigureMaker, Plot } from '../ui/plot/plot';
import { decimalsForGap, formatNumber } from '../ui/quantity/quantity-format';
import { QuantityPipe } from '../ui/quantity/quantity-pipes';
import { dotCoolers, dotPoints } from './run-dots';
import { dotsFigure, dotsHeight } from './run-dots-figure';

/** Every run as a dot by cooler and mount, and the same as a table. */
@Component({
  selector: 'tm-every-run',
  imports: [Plot, QuantityPipe],
  templateUrl: './every-run.html',
  styleUrl: './every-run.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class EveryRun {
  readonly verdict = input.required<Verdict>();
  readonly pair = input.required<PairResult>();

  protected readonly coolers = computed(() => {
    const { input: judged, judgement } = this.verdict();
    return dotCoolers(judged, judgement, this.pair());
  });
  protected readonly unit = computed(() => this.verdict().unit);
  /** As many as the pair's gap is given with, so that sentence, chart and table show the same means. */
  private readonly decimals = computed(() =>
    decimalsForGap(this.pair().gap, this.pair().marginOfError, this.unit()),
  );
  protected readonly quantity = computed(() =>
    this.unit() === '°C' ? 'steady-window mean, °C over ambient' : 'steady-window mean, K/W',
  );
  protected readonly height = computed(() => dotsHeight(this.coolers()));
  protected readonly points = computed(() => dotPoints(this.coolers(), this.unit()));
  protected readonly figure = computed<FigureMaker>(() => {
    const [coolers, unit, quantity, decimals] = [
      this.coolers(),
      this.unit(),
      this.quantity(),
      this.decimals(),
    ];
    return (theme, width) => dotsFigure(coolers, unit, quantity, decimals, theme, width);
  });
  protected readonly label = computed(() => {
    const means = this.coolers()
      .filter(({ mean }) => mean !== null)
      .map(({ name, mean }) => `${name} ${formatNumber(mean ?? 0, this.decimals())}`);
    return `Every run by mount, in ${this.unit()}. Means: ${means.join(', ')}. The table below the chart holds the same figures.`;
  });
  protected readonly note = computed(() => {
    const byMount = this.verdict().input.coolers.some(({ mountsRecorded }) => mountsRecorded);
    const leftOut = this.verdict().input.leftOut.length > 0 ? '; a cross is a run left out' : '';
    return (
      (byMount
        ? 'the short bar is the mount’s mean, the long bar the cooler’s'
        : 'mounts were not recorded; the bar is the cooler’s mean') + leftOut
    );
  });
}
