import { ChangeDetectionStrategy, Component, computed, input } from '@angular/core';
import { DroppedLog, needsALook } from './dropped-log';

const GAP = 6;

/** One tick a log: short waiting, growing while read, mid done, tall where a look is needed. */
@Component({
  selector: 'tm-batch-ticks',
  changeDetection: ChangeDetectionStrategy.OnPush,
  template: `
    <svg [attr.width]="ticks().length * gap" height="22" aria-hidden="true">
      @for (tick of ticks(); track $index) {
        <path [attr.d]="'M' + tick.x + ' 22v-' + tick.height" [class]="tick.kind" />
      }
    </svg>
  `,
  styles: `
    svg {
      display: block;
      max-width: 100%;
    }
    path {
      stroke: var(--edge);
      stroke-width: 2;
    }
    .read {
      stroke: var(--ink);
    }
    .look {
      stroke: var(--weak);
    }
    .reading {
      stroke: var(--spirit);
    }
  `,
})
export class BatchTicks {
  readonly logs = input.required<readonly DroppedLog[]>();
  protected readonly gap = GAP;
  protected readonly ticks = computed(() =>
    this.logs().map((log, index) => {
      const x = index * GAP + 1;
      if (needsALook(log)) return { x, height: 20, kind: 'look' };
      if (log.state === 'waiting') return { x, height: 5, kind: 'waiting' };
      if (log.state === 'reading') return { x, height: 5 + Math.round(9 * log.progress), kind: 'reading' };
      return { x, height: 14, kind: 'read' };
    }),
  );
}
