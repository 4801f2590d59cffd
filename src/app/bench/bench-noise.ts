import { ChangeDetectionStrategy, Component, computed, inject, input } from '@angular/core';
import { RouterLink } from '@angular/router';
import { load } from '../ui/loading/load';
import { WaitingFor } from '../ui/loading/waiting-for';
import { MomentPipe } from '../ui/moment/moment-pipe';
import { formatLevel } from '../ui/quantity/quantity-format';
import { BenchClient } from './bench-client';
import { SpreadScale } from './spread-scale';
import { VisibleGapCurve } from './visible-gap-curve';

/** What one bench can tell apart, learnt from the verdicts made on it. */
@Component({
  selector: 'tm-bench-noise',
  changeDetection: ChangeDetectionStrategy.OnPush,
  imports: [RouterLink, WaitingFor, MomentPipe, SpreadScale, VisibleGapCurve],
  templateUrl: './bench-noise.html',
  styleUrl: './bench-noise.scss',
})
export class BenchNoisePage {
  private readonly client = inject(BenchClient);
  readonly id = input.required<string>();
  protected readonly noise = load(() => this.client.noise(this.id()));
  protected readonly level = formatLevel;

  protected readonly headline = computed(() => {
    const noise = this.noise.value();
    if (!noise) return 'Bench';
    const five = noise.visible.find(({ mounts }) => mounts === 5);
    return five
      ? `${noise.bench.name} sees gaps of ${five.gap.toFixed(2)} °C at five mounts each`
      : `${noise.bench.name}: noise not measured yet`;
  });
  protected readonly lead = computed(() => {
    const noise = this.noise.value();
    if (!noise) return '';
    const { spreadBetweenRuns, spreadOfMountMeans } = noise.pooled;
    if (spreadOfMountMeans === null || spreadBetweenRuns === null)
      return 'It shows once a study here has two mounts of each cooler and is judged.';
    const from = noise.spreads.length === 1 ? '1 verdict' : `${noise.spreads.length} verdicts`;
    return spreadOfMountMeans > spreadBetweenRuns
      ? `Remounting, not repeating, is what limits it. Learnt from ${from}.`
      : `Repeating moves a reading as much as remounting. Learnt from ${from}.`;
  });
}
