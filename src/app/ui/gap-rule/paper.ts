import { ApplicationRef, DestroyRef, DOCUMENT, inject, Injectable, signal } from '@angular/core';

/** Whether the page is being laid out for paper. */
@Injectable({ providedIn: 'root' })
export class Paper {
  private readonly application = inject(ApplicationRef);
  private readonly state = signal(false);
  readonly laidOut = this.state.asReadonly();

  constructor() {
    const view = inject(DOCUMENT).defaultView;
    const stop = new AbortController();
    const set = (onPaper: boolean): void => {
      if (this.state() === onPaper) return;
      this.state.set(onPaper);
      // The browser lays the paper out as soon as the handler returns, so every drawing must be redone by then.
      this.application.tick();
    };
    view?.addEventListener('beforeprint', () => set(true), { signal: stop.signal });
    view?.addEventListener('afterprint', () => set(false), { signal: stop.signal });
    view
      ?.matchMedia?.('print')
      .addEventListener('change', ({ matches }) => set(matches), { signal: stop.signal });
    inject(DestroyRef).onDestroy(() => stop.abort());
  }
}
