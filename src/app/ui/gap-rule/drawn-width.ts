import {
  ChangeDetectorRef,
  computed,
  DestroyRef,
  DOCUMENT,
  ElementRef,
  inject,
  Signal,
  signal,
} from '@angular/core';

/** Width of a page's text on paper, px. */
export const PAPER_WIDTH = 716;

export interface DrawnWidth {
  /** Width to draw at, CSS px. */
  readonly width: Signal<number>;
  /** Whether the drawing is for paper. */
  readonly onPaper: Signal<boolean>;
}

/**
 * The width a drawing gets, measured as the page changes and fixed on paper. Call while a component is made.
 * @param unmeasured px to draw at until the first measurement
 * @param paper px to draw at on paper; null keeps the measured width, for drawings in a cell of a table
 */
export function drawnWidth(unmeasured: number, paper: number | null = PAPER_WIDTH): DrawnWidth {
  const host = inject<ElementRef<HTMLElement>>(ElementRef).nativeElement;
  const changes = inject(ChangeDetectorRef);
  const view = inject(DOCUMENT).defaultView;
  const measured = signal(unmeasured);
  const onPaper = signal(false);
  const result: DrawnWidth = {
    width: computed(() => (onPaper() && paper !== null ? paper : measured())),
    onPaper,
  };
  if (!view) return result;

  const stop = new AbortController();
  const observer =
    'ResizeObserver' in view
      ? new ResizeObserver(([entry]) => {
          const width = Math.floor(entry.contentRect.width);
          if (width > 0 && !onPaper()) measured.set(width);
        })
      : null;
  observer?.observe(host);

  const setPaper = (paper: boolean): void => {
    onPaper.set(paper);
    // The browser lays the paper out as soon as the handler returns, so the new drawing must be there by then.
    changes.detectChanges();
  };
  view.addEventListener('beforeprint', () => setPaper(true), { signal: stop.signal });
  view.addEventListener('afterprint', () => setPaper(false), { signal: stop.signal });
  view
    .matchMedia?.('print')
    .addEventListener('change', ({ matches }) => setPaper(matches), { signal: stop.signal });

  inject(DestroyRef).onDestroy(() => {
    stop.abort();
    observer?.disconnect();
  });
  return result;
}
