import { ChangeDetectionStrategy, Component, computed, input } from '@angular/core';
import { SteadyWindow, TraceSketch } from '../../../../shared/contracts/run-summary';

const WIDTH = 108;
const HEIGHT = 28;

/** A run's trace in a row of a table: rise over time, its steady window washed. Missing readings break the line. */
@Component({
  selector: 'tm-trace-sketch-drawing',
  changeDetection: ChangeDetectionStrategy.OnPush,
  template: `
    <svg [attr.width]="width" [attr.height]="height" role="img" [attr.aria-label]="label()">
      <rect [attr.x]="band().x" y="0" [attr.width]="band().width" [attr.height]="height" class="wash" />
      <path [attr.d]="line()" />
    </svg>
  `,
  styles: `
    svg {
      display: block;
    }
    .wash {
      fill: var(--spirit-wash);
      stroke: var(--spirit);
      stroke-width: 1;
    }
    path {
      fill: none;
      stroke: var(--ink);
      stroke-width: 1.2;
    }
  `,
})
export class TraceSketchDrawing {
  readonly sketch = input.required<TraceSketch>();
  readonly window = input.required<Pick<SteadyWindow, 'from' | 'to'>>();
  protected readonly width = WIDTH;
  protected readonly height = HEIGHT;

  private readonly x = computed(() => {
    const seconds = this.sketch().seconds;
    const first = seconds[0] ?? 0;
    const span = (seconds.at(-1) ?? 1) - first || 1;
    return (at: number): number => ((at - first) / span) * WIDTH;
  });
  protected readonly band = computed(() => {
    const from = this.x()(this.window().from);
    return { x: from, width: Math.max(0, this.x()(this.window().to) - from) };
  });
  protected readonly line = computed(() => {
    const { seconds, rise } = this.sketch();
    const known = rise.filter((value) => value !== null);
    const low = Math.min(...known);
    const span = Math.max(...known) - low || 1;
    let path = '';
    let pen = 'M';
    rise.forEach((value, index) => {
      if (value === null) {
        pen = 'M';
        return;
      }
      const y = HEIGHT - 2 - ((value - low) / span) * (HEIGHT - 4);
      path += `${pen}${this.x()(seconds[index]).toFixed(1)} ${y.toFixed(1)}`;
      pen = 'L';
    });
    return path;
  });
  protected readonly label = computed(
    () =>
      `Trace; steady window from ${Math.round(this.window().from)} s to ${Math.round(this.window().to)} s`,
  );
}
