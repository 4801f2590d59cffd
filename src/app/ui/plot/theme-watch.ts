import { DestroyRef, DOCUMENT, inject, Injectable, Signal, signal } from '@angular/core';

/** Counts changes of theme, by the system or by the person, so that drawings with fixed colours can follow. */
@Injectable({ providedIn: 'root' })
export class ThemeWatch {
  private readonly count = signal(0);
  readonly changes: Signal<number> = this.count.asReadonly();

  constructor() {
    const page = inject(DOCUMENT);
    const changed = (): void => this.count.update((count) => count + 1);
    const schemes = page.defaultView?.matchMedia?.('(prefers-color-scheme: dark)');
    schemes?.addEventListener('change', changed);
    const attributes = new MutationObserver(changed);
    attributes.observe(page.documentElement, { attributeFilter: ['data-theme', 'class', 'style'] });
    inject(DestroyRef).onDestroy(() => {
      schemes?.removeEventListener('change', changed);
      attributes.disconnect();
    });
  }
}
