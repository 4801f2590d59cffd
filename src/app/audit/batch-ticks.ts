import { ChangeDetectionStrategy, Component, computed, input } from '@angular/core';
import { FindingLevel } from '../../../shared/contracts/run-summary';
import { drawnWidth } from '../ui/gap-rule/drawn-width';

/** Where a verdict of a batch stands; the weight of its result once it is done. */
export type TickState = 'waiting' | 'now' | FindingLevel;

/** Heights by state, px: short waiting, growing while read, mid done, tall "look here". */
const HEIGHTS: Record<TickState, number> = { waiting: 4, now: 8, note: 20, caution: 28, stop: 28 };
const HEAVIEST: readonly TickState[] = ['stop', 'caution', 'now', 'waiting', 'note'];
const WIDEST = 11;
const CLOSEST = 3;
const BASE = 29;

export interface BatchTicksDrawing {
  /** One path a state, so that a thousand ticks are five elements. */
  readonly paths: readonly { readonly state: TickState; readonly d: string }[];
  /** Verdicts a tick stands for. */
  readonly each: number;
}

/** One tick a verdict; where they would run together, one tick for several, drawn as the heaviest of them. */
export function drawBatchTicks(states: readonly TickState[], width: number): BatchTicksDrawing {
  const each = Math.max(1, Math.ceil((states.length * CLOSEST) / Math.max(width, 1)));
  const drawn: TickState[] = [];
  for (let i = 0; i < states.length; i += each) {
    const group = states.slice(i, i + each);
    drawn.push(HEAVIEST.find((state) => group.includes(state)) ?? 'waiting');
  }
  const pitch = Math.min(WIDEST, width / Math.max(drawn.length, 1));
  const paths = new Map<TickState, string>();
  drawn.forEach((state, i) => {
    const x = Math.round(2 + i * pitch);
    paths.set(state, `${paths.get(state) ?? ''}M${x} ${BASE - 1}v${-HEIGHTS[state]}`);
  });
  return { paths: [...paths].map(([state, d]) => ({ state, d })), each };
}

/** The progress of a batch as a rule of ticks. */
@Component({
  selector: 'tm-batch-ticks',
  template: `
    <svg
      role="progressbar"
      height="30"
      aria-valuemin="0"
      [attr.width]="width()"
      [attr.aria-valuenow]="done()"
      [attr.aria-valuemax]="states().length"
      [attr.aria-label]="done() + ' of ' + states().length + ' re-run'"
    >
      <path class="base" [attr.d]="'M0 29H' + width()" />
      @for (path of drawing().paths; track path.state) {
        <path [class]="path.state" [attr.d]="path.d" />
      }
    </svg>
    <p class="caption">
      {{ drawing().each === 1 ? 'One tick a verdict' : 'One tick for ' + drawing().each + ' verdicts' }},
      newest first. Mid tick: identical. Tall tick: look here. Short: waiting.
    </p>
  `,
  styles: `
    :host {
      display: block;
      min-width: 0;
      padding: 6px 0 14px;
    }
    svg {
      display: block;
      max-width: 100%;
      overflow: visible;
    }
    path {
      fill: none;
      stroke: var(--ink);
      stroke-width: 2;
    }
    .base {
      stroke-width: 1;
    }
    .waiting {
      stroke: var(--edge);
      stroke-width: 1;
    }
    .now {
      stroke: var(--spirit);
    }
    .caution {
      stroke: var(--weak);
    }
    .stop {
      stroke: var(--stop);
    }
    p {
      padding-top: 4px;
    }
  `,
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class BatchTicks {
  readonly states = input.required<readonly TickState[]>();
  protected readonly width = drawnWidth(1328).width;
  protected readonly drawing = computed(() => drawBatchTicks(this.states(), this.width()));
  protected readonly done = computed(
    () => this.states().filter((state) => state !== 'waiting' && state !== 'now').length,
  );
}
