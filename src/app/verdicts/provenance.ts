import { ChangeDetectionStrategy, Component, computed, input, output } from '@angular/core';
import { Verdict } from '../../../shared/contracts';
import { DayPipe, MomentPipe } from '../ui/moment/moment-pipe';
import { decimalsFor, formatLevel, formatNumber, withUnit } from '../ui/quantity/quantity-format';
import { plural, shortDigest } from './verdict-words';
import { exportAddress, logAddress } from './verdicts-client';

/** Where the verdict comes from: data, method, thresholds, logs and the last re-run. */
@Component({
  selector: 'tm-provenance',
  imports: [DayPipe, MomentPipe],
  templateUrl: './provenance.html',
  styleUrl: './provenance.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class Provenance {
  readonly verdict = input.required<Verdict>();
  /** Whether a re-run is under way. */
  readonly reRunning = input(false);
  readonly reRun = output<void>();

  protected readonly digest = computed(() => shortDigest(this.verdict().dataDigest));
  protected readonly logCount = computed(() => plural(this.verdict().logs.length, 'log'));
  protected readonly rules = computed(() => {
    const { confidence, power, gapThatMatters } = this.verdict().thresholds.values;
    const matters = withUnit(formatNumber(gapThatMatters, decimalsFor(null, '°C')), '°C');
    return `${formatLevel(confidence)} confidence, ${formatLevel(power)} power, ${matters} matters`;
  });
  protected readonly exportAddress = computed(() => exportAddress(this.verdict().id));
  protected readonly logs = computed(() =>
    this.verdict().logs.map((log) => ({
      name: log.fileName,
      address: logAddress(log.runId),
      digest: shortDigest(log.digest),
      whole: log.digest,
    })),
  );
}
