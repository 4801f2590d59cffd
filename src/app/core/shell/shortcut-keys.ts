import { DestroyRef, DOCUMENT, inject, Injectable, signal } from '@angular/core';
import { takeUntilDestroyed } from '@angular/core/rxjs-interop';
import { Router } from '@angular/router';
import { fromEvent } from 'rxjs';
import { Preferences } from '../preferences';
import { Session } from '../session';
import { placesFor } from './places';

const TYPING = 'input, textarea, select, [contenteditable], [role="textbox"]';

/** Single-letter keys that go places: `g` then a place's letter, `/` to the search, `?` for the list. */
@Injectable({ providedIn: 'root' })
export class ShortcutKeys {
  private readonly document = inject(DOCUMENT);
  private readonly router = inject(Router);
  private readonly session = inject(Session);
  private readonly preferences = inject(Preferences);
  private going = false;

  readonly showList = signal(false);

  listen(until: DestroyRef): void {
    fromEvent<KeyboardEvent>(this.document, 'keydown')
      .pipe(takeUntilDestroyed(until))
      .subscribe((event) => this.press(event));
  }

  private press(event: KeyboardEvent): void {
    const typing = event.target instanceof Element && event.target.closest(TYPING) !== null;
    if (!this.preferences.shortcuts() || typing || event.ctrlKey || event.metaKey || event.altKey) return;
    const going = this.going;
    this.going = event.key === 'g' && !going;
    const place = going && placesFor(this.session.roles()).find(({ key }) => key === event.key);
    if (place) {
      event.preventDefault();
      void this.router.navigateByUrl(place.path);
    } else if (event.key === '?') {
      event.preventDefault();
      this.showList.set(true);
    } else if (event.key === '/') {
      event.preventDefault();
      void this.router.navigate(['/studies'], { queryParams: { find: 1 } });
    }
  }
}
