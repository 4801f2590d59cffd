import { ChangeDetectionStrategy, Component, computed, input } from '@angular/core';
import { BenchNoise } from '../../../shared/contracts/benches';
import { drawnWidth } from '../ui/gap-rule/drawn-width';

const LEFT = 92;
const RIGHT = 24;
/** Wider than this the dots only drift apart. */
const WIDEST = 640;

/** Spread between runs and between mounts, one dot a verdict, on one ruled scale. */
@Component({
  selector: 'tm-spread-scale',
  changeDetection: ChangeDetectionStrategy.OnPush,
  template: `
    <svg [attr.width]="width()" height="120" role="img" [attr.aria-label]="label()">
      @for (row of rows(); track row.name) {
        <text [attr.x]="0" [attr.y]="row.y + 4" class="name">{{ row.name }}</text>
        <path [attr.d]="'M' + left + ' ' + row.y + 'H' + end()" class="hair" />
        @for (dot of row.dots; track $index) {
          <circle [attr.cx]="dot" [attr.cy]="row.y" r="4.5" [class.solid]="row.solid" />
        }
        @if (row.pooled; as pooled) {
          <path
            [attr.d]="'M' + pooled.x + ' ' + (row.y - 14) + 'v22'"
            class="mean"
            [class.solid]="row.solid"
          />
          <text [attr.x]="pooled.x" [attr.y]="row.y - 18" text-anchor="middle" class="name">
            {{ pooled.text }}
          </text>
        }
      }
      <path [attr.d]="'M' + left + ' 92H' + end()" class="axis" />
      @for (tick of ticks(); track tick.x) {
        <path [attr.d]="'M' + tick.x + ' 92v' + (tick.text ? 8 : 4)" class="axis" />
        @if (tick.text) {
          <text [attr.x]="tick.x" y="114" text-anchor="middle">{{ tick.text }}</text>
        }
      }
    </svg>
  `,
  styles: `
    :host {
      display: block;
    }
    svg {
      display: block;
      max-width: 100%;
      overflow: visible;
    }
    text {
      fill: var(--ink-2);
      font-family: inherit;
      font-size: 12px;
    }
    .name {
      fill: var(--ink);
      font-weight: 600;
    }
    .hair {
      stroke: var(--hair);
    }
    .axis {
      fill: none;
      stroke: var(--ink);
    }
    circle {
      fill: var(--plate);
      stroke: var(--ink);
      stroke-width: 1.5;
    }
    circle.solid {
      fill: var(--spirit);
      stroke: var(--spirit);
    }
    .mean {
      stroke: var(--ink);
      stroke-width: 1.5;
    }
    .mean.solid {
      stroke: var(--spirit);
    }
  `,
})
export class SpreadScale {
  readonly noise = input.required<BenchNoise>();
  // Drawn at the width it gets, so that its numbers stay as large as those around it.
  private readonly drawn = drawnWidth(WIDEST);
  protected readonly width = computed(() => Math.min(this.drawn.width(), WIDEST));
  protected readonly left = LEFT;
  protected readonly end = computed(() => this.width() - RIGHT);

  private readonly reach = computed(() => {
    const { spreads, pooled } = this.noise();
    const all = spreads.flatMap((spread) => [spread.spreadBetweenRuns ?? 0, spread.spreadBetweenMounts ?? 0]);
    return Math.max(0.2, Math.ceil(Math.max(...all, pooled.spreadOfMountMeans ?? 0) * 10 + 0.5) / 10);
  });
  private readonly x = computed(() => {
    const reach = this.reach();
    const span = this.end() - LEFT;
    return (value: number): number => LEFT + (value / reach) * span;
  });
  protected readonly rows = computed(() => {
    const { spreads, pooled } = this.noise();
    const at = this.x();
    const known = (values: (number | null)[]) => values.filter((value) => value !== null).map(at);
    const mean = (value: number | null) => (value === null ? null : { x: at(value), text: value.toFixed(2) });
    return [
      {
        name: 'remounting',
        y: 30,
        solid: true,
        dots: known(spreads.map(({ spreadBetweenMounts }) => spreadBetweenMounts)),
        pooled: mean(pooled.spreadOfMountMeans),
      },
      {
        name: 'repeating',
        y: 72,
        solid: false,
        dots: known(spreads.map(({ spreadBetweenRuns }) => spreadBetweenRuns)),
        pooled: mean(pooled.spreadBetweenRuns),
      },
    ];
  });
  protected readonly ticks = computed(() => {
    const tenths = Math.round(this.reach() * 10);
    const every = tenths > 12 ? 5 : 1;
    return Array.from({ length: tenths + 1 }, (_, tenth) => ({
      x: this.x()(tenth / 10),
      text: tenth % every === 0 ? (tenth / 10).toFixed(1) : null,
    }));
  });
  protected readonly label = computed(() => {
    const { spreadBetweenRuns, spreadOfMountMeans } = this.noise().pooled;
    const words = (value: number | null) => (value === null ? 'unknown' : `${value.toFixed(2)} °C`);
    return `Pooled spread: remounting ${words(spreadOfMountMeans)}, repeating ${words(spreadBetweenRuns)}. The table below lists every verdict.`;
  });
}
