import { DOCUMENT, effect, inject, Injectable, signal } from '@angular/core';

export type Theme = 'system' | 'light' | 'dark';

const KEY = 'tenthmark.preferences';

/** How one person on this device wants the pages: theme and single-letter shortcuts. */
@Injectable({ providedIn: 'root' })
export class Preferences {
  private readonly document = inject(DOCUMENT);
  private readonly kept = this.read();

  readonly theme = signal<Theme>(this.kept.theme);
  readonly shortcuts = signal(this.kept.shortcuts);

  constructor() {
    effect(() => {
      const theme = this.theme();
      const root = this.document.documentElement;
      if (theme === 'system') delete root.dataset['theme'];
      else root.dataset['theme'] = theme;
      this.write({ theme, shortcuts: this.shortcuts() });
    });
  }

  private read(): { theme: Theme; shortcuts: boolean } {
    try {
      const kept = JSON.parse(localStorage.getItem(KEY) ?? '{}') as { theme?: Theme; shortcuts?: boolean };
      return { theme: kept.theme ?? 'system', shortcuts: kept.shortcuts ?? true };
    } catch {
      // Storage can be closed to us (private windows) or hold something else; the defaults serve.
      return { theme: 'system', shortcuts: true };
    }
  }

  private write(preferences: { theme: Theme; shortcuts: boolean }): void {
    try {
      localStorage.setItem(KEY, JSON.stringify(preferences));
    } catch {
      // The choice then holds until the page is closed.
    }
  }
}
