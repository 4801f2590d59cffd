import { computed, DestroyRef, ElementRef, inject, Signal, signal } from '@angular/core';
import { Paper } from './paper';

/** Width of a page's text on paper, px. */
const PAPER_WIDTH = 716;

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
  const onPaper = inject(Paper).laidOut;
  const measured = signal(unmeasured);
  if ('ResizeObserver' in globalThis) {
    const observer = new ResizeObserver(([entry]) => {
      const width = Math.floor(entry.contentRect.width);
      if (width > 0 && !onPaper()) measured.set(width);
    });
    observer.observe(host);
    inject(DestroyRef).onDestroy(() => observer.disconnect());
  }
  return { width: computed(() => (onPaper() && paper !== null ? paper : measured())), onPaper };
}
