import {
  ChangeDetectionStrategy,
  Component,
  computed,
  effect,
  ElementRef,
  inject,
  input,
  OnDestroy,
  signal,
  viewChild,
} from '@angular/core';
import type { Data, Layout } from 'plotly.js-dist-min';
import { drawnWidth } from '../gap-rule/drawn-width';
import { CHART_CONFIG, chartTemplate } from './chart-template';
import { ChartTheme, PAPER_THEME, readChartTheme } from './chart-theme';
import { Plotly, loadPlotly } from './plotly-loader';
import { savePicture } from './save-picture';
import { ThemeWatch } from './theme-watch';

/** What to draw: traces and what differs from the template. */
export interface Figure {
  readonly data: Data[];
  readonly layout: Partial<Layout>;
}

/** A place the arrow keys stop at, in reading order, with the words read out there. */
export interface PlotPoint {
  readonly curve: number;
  readonly index: number;
  readonly words: string;
}

/** Makes the figure for a theme and a width, px. */
export type FigureMaker = (theme: ChartTheme, width: number) => Figure;

let plotsMade = 0;

/**
 * A chart with its two buttons. The projected table holds the same figures and is shown on demand. Arrow keys
 * step through `points`; what stands there is read out politely.
 */
@Component({
  selector: 'tm-plot',
  templateUrl: './plot.html',
  styleUrl: './plot.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class Plot implements OnDestroy {
  readonly figure = input.required<FigureMaker>();
  /** px */
  readonly height = input.required<number>();
  /** One sentence that says what the chart shows and names the table. */
  readonly label = input.required<string>();
  /** Name of the saved picture, without ending. */
  readonly fileName = input('chart');
  readonly points = input<readonly PlotPoint[]>([]);

  protected readonly id = `plot-${++plotsMade}`;
  protected readonly tableShown = signal(false);
  protected readonly failed = signal(false);
  protected readonly readOut = signal('');
  protected readonly ready = signal(false);

  private readonly frame = viewChild.required<ElementRef<HTMLElement>>('frame');
  private readonly host = inject<ElementRef<HTMLElement>>(ElementRef).nativeElement;
  private readonly drawn = drawnWidth(716);
  private readonly themes = inject(ThemeWatch);
  private readonly plotly = signal<Plotly | null>(null);
  private at = -1;

  private readonly picture = computed(() => {
    this.themes.changes();
    const onPaper = this.drawn.onPaper();
    const theme = onPaper ? PAPER_THEME : readChartTheme(this.host);
    const width = this.drawn.width();
    const { data, layout } = this.figure()(theme, width);
    const template = chartTemplate(theme);
    return { theme, data, layout: { ...template, ...layout, width, height: this.height() } };
  });

  constructor() {
    void this.load();
    effect(() => {
      const plotly = this.plotly();
      const { data, layout } = this.picture();
      if (!plotly) return;
      void plotly.react(this.frame().nativeElement, data, layout, CHART_CONFIG);
      this.ready.set(true);
    });
  }

  ngOnDestroy(): void {
    this.plotly()?.purge(this.frame().nativeElement);
  }

  protected async load(): Promise<void> {
    this.failed.set(false);
    try {
      this.plotly.set(await loadPlotly());
    } catch {
      // The chunk did not arrive; the table holds the same figures, so it is shown in the chart's place.
      this.failed.set(true);
      this.tableShown.set(true);
    }
  }

  protected toggleTable(): void {
    this.tableShown.update((shown) => !shown);
  }

  protected async savePicture(): Promise<void> {
    const plotly = this.plotly();
    if (plotly) await savePicture(plotly, this.picture(), this.fileName(), this.host.ownerDocument);
  }

  protected step(event: Event, by: number): void {
    const points = this.points();
    if (points.length === 0) return;
    event.preventDefault();
    this.at = this.at < 0 ? (by > 0 ? 0 : points.length - 1) : (this.at + by + points.length) % points.length;
    const point = points[this.at];
    this.readOut.set(point.words);
    this.plotly()?.Fx.hover(this.frame().nativeElement, [
      { curveNumber: point.curve, pointNumber: point.index },
    ]);
  }

  protected leave(): void {
    this.at = -1;
    this.readOut.set('');
    const plotly = this.plotly();
    if (plotly && this.ready()) plotly.Fx.unhover(this.frame().nativeElement);
  }
}
