import {
  ChangeDetectionStrategy,
  Component,
  computed,
  ElementRef,
  inject,
  input,
  output,
  signal,
} from '@angular/core';
import { TraceSketch } from '../../../../shared/contracts/run-summary';
import { clockWords, spokenClock } from './clock-words';

const WIDTH = 372;
const HEIGHT = 190;
const BOTTOM = 168;
const TOP = 6;
const LEFT = 4;

type End = 'from' | 'to';

/** A log's trace with its steady window, whose two ends can be dragged or moved by keys. */
@Component({
  selector: 'tm-trace-editor',
  changeDetection: ChangeDetectionStrategy.OnPush,
  templateUrl: './trace-editor.html',
  styleUrl: './trace-editor.scss',
})
export class TraceEditor {
  private readonly host = inject<ElementRef<HTMLElement>>(ElementRef).nativeElement;
  readonly sketch = input.required<TraceSketch>();
  /** Seconds since the log's start. */
  readonly window = input.required<{ readonly from: number; readonly to: number }>();
  readonly moved = output<{ from: number; to: number }>();

  protected readonly width = WIDTH;
  protected readonly height = HEIGHT;
  protected readonly bottom = BOTTOM;
  protected readonly left = LEFT;
  protected readonly top = TOP;
  /** While an end is dragged the drawing follows at once; the numbers come when it is let go. */
  private readonly dragged = signal<{ readonly from: number; readonly to: number } | null>(null);
  protected readonly shown = computed(() => this.dragged() ?? this.window());
  protected readonly duration = computed(() => this.sketch().seconds.at(-1) ?? 1);

  protected readonly x = computed(() => {
    const duration = this.duration();
    return (seconds: number): number => LEFT + (seconds / duration) * (WIDTH - 2 * LEFT);
  });
  private readonly extent = computed(() => {
    const known = this.sketch().rise.filter((value) => value !== null);
    const low = Math.min(0, ...known);
    return { low, high: Math.max(low + 1, ...known) };
  });
  private readonly y = computed(() => {
    const { low, high } = this.extent();
    return (rise: number): number => BOTTOM - ((rise - low) / (high - low)) * (BOTTOM - TOP);
  });
  protected readonly line = computed(() => {
    const { seconds, rise } = this.sketch();
    let path = '';
    let pen = 'M';
    rise.forEach((value, index) => {
      if (value === null) {
        pen = 'M';
        return;
      }
      path += `${pen}${this.x()(seconds[index]).toFixed(1)} ${this.y()(value).toFixed(1)}`;
      pen = 'L';
    });
    return path;
  });
  /** Ticks of the rise every 1 °C, longer every 10. */
  protected readonly riseTicks = computed(() => {
    const { low, high } = this.extent();
    const every = high - low > 30 ? 2 : 1;
    // The unit stands once, at the highest number.
    const highest = Math.floor(high / 20) * 20;
    const ticks = [];
    for (let rise = Math.ceil(low); rise <= high; rise += every)
      ticks.push({
        y: this.y()(rise),
        length: rise % 20 === 0 ? 14 : rise % 10 === 0 ? 10 : 5,
        text:
          rise % 20 !== 0 || rise === 0
            ? null
            : rise === highest
              ? `${rise}\u00a0°C over ambient`
              : String(rise),
      });
    return ticks;
  });
  protected readonly timeTicks = computed(() => {
    const minutes = this.duration() / 60;
    const every = minutes > 60 ? 20 : minutes > 20 ? 10 : 5;
    return Array.from({ length: Math.floor(minutes / every) + 1 }, (_, index) => ({
      x: this.x()(index * every * 60),
      text: index === 0 ? '0 min' : String(index * every),
    }));
  });
  protected readonly ends: readonly { readonly end: End; readonly name: string }[] = [
    { end: 'from', name: 'Steady from' },
    { end: 'to', name: 'Steady to' },
  ];
  protected readonly spoken = spokenClock;
  protected readonly clock = clockWords;

  protected start(end: End, event: PointerEvent): void {
    event.preventDefault();
    const handle = event.currentTarget as SVGElement;
    handle.setPointerCapture(event.pointerId);
    (handle as unknown as HTMLElement).focus();
    const move = (moved: PointerEvent): void =>
      this.dragged.set(this.with(end, this.secondsAt(moved.clientX)));
    const stop = (): void => {
      handle.removeEventListener('pointermove', move);
      const window = this.dragged();
      this.dragged.set(null);
      if (window) this.moved.emit(window);
    };
    handle.addEventListener('pointermove', move);
    handle.addEventListener('pointerup', stop, { once: true });
    handle.addEventListener('pointercancel', stop, { once: true });
  }

  /** Arrows move an end by 1 s, with Shift by 10 s, Page by 60 s. */
  protected key(end: End, event: KeyboardEvent): void {
    const size = event.shiftKey ? 10 : 1;
    const steps: Record<string, number> = {
      ArrowLeft: -size,
      ArrowDown: -size,
      ArrowRight: size,
      ArrowUp: size,
      PageDown: -60,
      PageUp: 60,
      Home: -Infinity,
      End: Infinity,
    };
    const step = steps[event.key];
    if (step === undefined) return;
    event.preventDefault();
    this.moved.emit(this.with(end, this.window()[end] + step));
  }

  private with(end: End, seconds: number): { from: number; to: number } {
    const { from, to } = this.window();
    const whole = Math.round(seconds);
    return end === 'from'
      ? { from: Math.max(0, Math.min(whole, to - 1)), to }
      : { from, to: Math.min(Math.floor(this.duration()), Math.max(whole, from + 1)) };
  }

  private secondsAt(clientX: number): number {
    const box = this.host.querySelector('svg')?.getBoundingClientRect();
    if (!box) return 0;
    const share = (clientX - box.left) / box.width;
    return ((share * WIDTH - LEFT) / (WIDTH - 2 * LEFT)) * this.duration();
  }
}
