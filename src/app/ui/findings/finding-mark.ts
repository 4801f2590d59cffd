import { ChangeDetectionStrategy, Component, input } from '@angular/core';
import { FindingLevel } from '../../../../shared/contracts';

/** Ring, half disc or barred square: how much a finding weighs, told by shape. Its words stand beside it. */
@Component({
  selector: 'tm-finding-mark',
  template: `
    <svg viewBox="0 0 14 14" width="14" height="14" aria-hidden="true">
      @switch (level()) {
        @case ('note') {
          <circle cx="7" cy="7" r="5" class="ring note" />
        }
        @case ('caution') {
          <circle cx="7" cy="7" r="5" class="ring caution" />
          <path d="M7 2A5 5 0 0 1 7 12Z" class="half" />
        }
        @case ('stop') {
          <rect x="1.5" y="1.5" width="11" height="11" class="square" />
          <path d="M4 7H10" class="bar" />
        }
      }
    </svg>
  `,
  styles: `
    :host {
      display: inline-block;
      line-height: 0;
    }
    svg {
      display: block;
      forced-color-adjust: none;
    }
    .ring {
      fill: none;
      stroke-width: 1.5;
    }
    .note {
      stroke: var(--ink-2);
    }
    .caution {
      stroke: var(--weak);
    }
    .half {
      fill: var(--weak);
    }
    .square {
      fill: var(--stop);
    }
    .bar {
      stroke: var(--ground, var(--plate));
      stroke-width: 2;
    }
    @media (forced-colors: active) {
      svg {
        --ink-2: CanvasText;
        --weak: CanvasText;
        --stop: CanvasText;
        --plate: Canvas;
        --ground: Canvas;
      }
    }
  `,
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class FindingMark {
  readonly level = input.required<FindingLevel>();
}
