import { ChangeDetectionStrategy, Component, input } from '@angular/core';
import { LogoMark } from '../../ui/logo-mark/logo-mark';

interface ScaleTick {
  readonly y: number;
  readonly length: number;
  readonly numeral: string | null;
}

const TICK_GAP = 14.2;
const TOP = 24;

/** Ticks of a standing thermometer scale, 44 °C at the top, tall enough for any window. */
const ticks: readonly ScaleTick[] = Array.from({ length: 140 }, (_, tenth) => ({
  y: Math.round(TOP + tenth * TICK_GAP) + 0.5,
  length: tenth % 10 === 0 ? 64 : tenth % 5 === 0 ? 40 : 22,
  numeral: tenth % 10 === 0 ? String(44 - tenth / 10) : null,
}));

/** The frame of the screens before one is in: a standing scale with a needle, the name, and what it does. */
@Component({
  selector: 'tm-entry-frame',
  changeDetection: ChangeDetectionStrategy.OnPush,
  imports: [LogoMark],
  template: `
    <svg class="scale" width="124" height="2000" aria-hidden="true">
      @for (tick of ticks; track tick.y) {
        <path [attr.d]="'M0 ' + tick.y + 'h' + tick.length" [class.whole]="tick.numeral !== null" />
        @if (tick.numeral) {
          <text x="76" [attr.y]="tick.y + 5">{{ tick.numeral }}</text>
        }
      }
      <path class="needle" d="M40 407.4L118 402V412.8Z" />
    </svg>
    <main>
      <div class="name"><tm-logo-mark [size]="38" /> <span>Tenthmark</span></div>
      <h1>{{ heading() }}</h1>
      <ng-content />
    </main>
  `,
  styleUrl: './entry-frame.scss',
})
export class EntryFrame {
  readonly heading = input('Says whether a measured gap is more than the bench’s own noise.');
  protected readonly ticks = ticks;
}
