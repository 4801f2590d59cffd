import {
  ChangeDetectionStrategy,
  Component,
  computed,
  DestroyRef,
  ElementRef,
  inject,
  signal,
  viewChild,
} from '@angular/core';
import { takeUntilDestroyed, toSignal } from '@angular/core/rxjs-interop';
import { NavigationEnd, Router, RouterLink, RouterLinkActive, RouterOutlet } from '@angular/router';
import { filter, map } from 'rxjs';
import { LogoMark } from '../../ui/logo-mark/logo-mark';
import { Notices } from '../../ui/notices/notices';
import { Session } from '../session';
import { WaitingCount } from '../waiting-count';
import { placesFor } from './places';
import { ShortcutKeys } from './shortcut-keys';
import { ShortcutList } from './shortcut-list';

/** The frame around every page: places over ticks, who is here, the way to skip ahead, and the notices. */
@Component({
  selector: 'tm-shell',
  changeDetection: ChangeDetectionStrategy.OnPush,
  imports: [RouterOutlet, RouterLink, RouterLinkActive, LogoMark, Notices, ShortcutList],
  templateUrl: './shell.html',
  styleUrl: './shell.scss',
})
export class Shell {
  private readonly router = inject(Router);
  protected readonly session = inject(Session);
  protected readonly waiting = inject(WaitingCount);
  protected readonly keys = inject(ShortcutKeys);
  private readonly main = viewChild.required<ElementRef<HTMLElement>>('main');

  protected readonly places = computed(() => placesFor(this.session.roles()));
  /** The phone's bar holds the four most used places; the rest stand under the account. */
  protected readonly phonePlaces = computed(() => this.places().slice(0, 4));
  protected readonly roleWords = computed(() =>
    this.session
      .roles()
      .map((role, index) => (index === 0 ? role[0].toUpperCase() + role.slice(1) : role))
      .join(', '),
  );
  protected readonly announced = signal('');
  private readonly address = toSignal(
    this.router.events.pipe(
      filter((event) => event instanceof NavigationEnd),
      map((event) => event.urlAfterRedirects),
    ),
    { initialValue: this.router.url },
  );
  protected readonly path = computed(() => this.address().split(/[?#]/)[0]);

  constructor() {
    this.waiting.refresh();
    this.keys.listen(inject(DestroyRef));
    let first = true;
    this.router.events
      .pipe(
        filter((event) => event instanceof NavigationEnd),
        takeUntilDestroyed(),
      )
      .subscribe(() => {
        this.waiting.refresh();
        // After a move the reader starts at the new page, as after loading one.
        if (!first) queueMicrotask(() => this.main().nativeElement.focus({ preventScroll: true }));
        first = false;
      });
  }

  protected skip(event: Event): void {
    event.preventDefault();
    this.main().nativeElement.focus();
  }
}
