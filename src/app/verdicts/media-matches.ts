import { DestroyRef, DOCUMENT, inject, Signal, signal } from '@angular/core';

/** Whether a media query holds, as it changes. Call while a component is made; false where there is no screen. */
export function mediaMatches(query: string): Signal<boolean> {
  const list = inject(DOCUMENT).defaultView?.matchMedia?.(query);
  const matches = signal(list?.matches ?? false);
  const changed = (event: MediaQueryListEvent): void => matches.set(event.matches);
  list?.addEventListener('change', changed);
  inject(DestroyRef).onDestroy(() => list?.removeEventListener('change', changed));
  return matches.asReadonly();
}
