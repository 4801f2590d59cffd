import { ChangeDetectionStrategy, Component, computed, input } from '@angular/core';
import { BenchNoise } from '../../../shared/contracts/benches';
import { drawnWidth } from '../ui/gap-rule/drawn-width';

const TOP = 12;
const LEFT = 44;
const BOTTOM = 220;
const HEIGHT = 268;
const WIDEST = 520;

/** The smallest gap the bench can see against mounts per cooler, with the gap that matters as a line across. */
@Component({
  selector: 'tm-visible-gap-curve',
  changeDetection: ChangeDetectionStrategy.OnPush,
  template: `
    @let box = frame();
    <svg [attr.width]="box.width" [attr.height]="box.height" role="img" [attr.aria-label]="label()">
      <path [attr.d]="'M' + box.left + ' ' + box.top + 'V' + box.bottom + 'H' + box.right" class="axis" />
      @for (tick of yTicks(); track tick.y) {
        <path [attr.d]="'M' + box.left + ' ' + tick.y + 'h' + (tick.text ? -8 : -4)" class="axis" />
        @if (tick.text) {
          <text [attr.x]="box.left - 12" [attr.y]="tick.y + 4" text-anchor="end">{{ tick.text }}</text>
        }
      }
      @for (point of points(); track point.mounts) {
        <path [attr.d]="'M' + point.x + ' ' + box.bottom + 'v6'" class="axis" />
        <text [attr.x]="point.x" [attr.y]="box.bottom + 20" text-anchor="middle">{{ point.mounts }}</text>
      }
      <text [attr.x]="box.right" [attr.y]="box.bottom + 40" text-anchor="end">mounts per cooler</text>
      <path [attr.d]="'M' + box.left + ' ' + mattersY() + 'H' + box.right" class="matters" />
      <text [attr.x]="box.right" [attr.y]="mattersY() - 5" text-anchor="end">
        {{ noise().gapThatMatters.toFixed(2) }} matters
      </text>
      <path [attr.d]="curve()" class="curve" />
      @for (point of points(); track point.mounts) {
        @if (point.inside) {
          <circle [attr.cx]="point.x" [attr.cy]="point.y" r="3.5" />
        }
      }
    </svg>
    <details>
      <summary>Show as table</summary>
      <table>
        <thead>
          <tr>
            <th>mounts per cooler</th>
            <th>smallest visible gap<small>°C</small></th>
          </tr>
        </thead>
        <tbody>
          @for (point of noise().visible; track point.mounts) {
            <tr>
              <td>{{ point.mounts }}</td>
              <td>{{ point.gap.toFixed(2) }}</td>
            </tr>
          }
        </tbody>
      </table>
    </details>
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
    .axis {
      fill: none;
      stroke: var(--ink);
    }
    .matters {
      stroke: var(--edge);
      stroke-dasharray: 4 3;
    }
    .curve {
      fill: none;
      stroke: var(--spirit);
      stroke-width: 2;
    }
    circle {
      fill: var(--spirit);
    }
    summary {
      min-height: 32px;
      color: var(--spirit);
      line-height: 32px;
      cursor: pointer;
    }
  `,
})
export class VisibleGapCurve {
  readonly noise = input.required<BenchNoise>();
  // Drawn at the width it gets, so that its numbers stay as large as those around it.
  private readonly drawn = drawnWidth(420);
  protected readonly frame = computed(() => {
    const width = Math.min(this.drawn.width(), WIDEST);
    return { left: LEFT, top: TOP, right: width - 16, bottom: BOTTOM, width, height: HEIGHT };
  });

  /** Two mounts see only very large gaps; letting them set the scale would flatten the rest. */
  private readonly top = computed(() => {
    const { visible, gapThatMatters } = this.noise();
    const three = visible.find(({ mounts }) => mounts >= 3)?.gap ?? visible[0]?.gap ?? 1;
    return Math.ceil(Math.max(three, gapThatMatters) * 2 + 0.4) / 2;
  });
  private readonly y = computed(() => {
    const top = this.top();
    return (gap: number): number => BOTTOM - (gap / top) * (BOTTOM - TOP);
  });
  protected readonly points = computed(() => {
    const visible = this.noise().visible;
    const { left, right } = this.frame();
    const most = Math.max(...visible.map(({ mounts }) => mounts));
    return visible.map(({ mounts, gap }) => ({
      mounts,
      x: left + ((mounts - 1) / most) * (right - left),
      y: this.y()(gap),
      inside: gap <= this.top(),
    }));
  });
  protected readonly curve = computed(() =>
    this.points()
      .filter(({ inside }) => inside)
      .map(({ x, y }, index) => `${index === 0 ? 'M' : 'L'}${x.toFixed(1)} ${y.toFixed(1)}`)
      .join(''),
  );
  protected readonly mattersY = computed(() => this.y()(this.noise().gapThatMatters));
  protected readonly yTicks = computed(() =>
    Array.from({ length: Math.round(this.top() * 10) + 1 }, (_, tenth) => ({
      y: this.y()(tenth / 10),
      text: tenth % 5 === 0 ? (tenth / 10).toFixed(1) : null,
    })),
  );
  protected readonly label = computed(() => {
    const each = this.noise().visible.map(({ mounts, gap }) => `${mounts} mounts ${gap.toFixed(2)} °C`);
    return `Smallest visible gap by mounts per cooler: ${each.join(', ')}`;
  });
}
