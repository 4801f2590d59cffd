import { ChangeDetectionStrategy, Component, computed, inject, signal } from '@angular/core';
import { FormControl, FormGroup, ReactiveFormsModule } from '@angular/forms';
import { Router, RouterLink } from '@angular/router';
import * as z from 'zod';
import { changePasswordRequestSchema } from '../../../shared/contracts/accounts';
import { Api } from '../core/api';
import { ApiProblem } from '../core/api-problem';
import { Preferences, Theme } from '../core/preferences';
import { Session } from '../core/session';
import { placesFor } from '../core/shell/places';
import { contractErrors, fieldError } from '../ui/field-error/contract-errors';
import { FieldError } from '../ui/field-error/field-error';
import { NoticeBoard } from '../ui/notices/notice-board';

const THEMES: readonly { readonly value: Theme; readonly name: string }[] = [
  { value: 'system', name: 'As the system' },
  { value: 'light', name: 'Light' },
  { value: 'dark', name: 'Dark' },
];

/** One's own account: who one is, how pages look on this device, the password, and the way out. */
@Component({
  selector: 'tm-account',
  changeDetection: ChangeDetectionStrategy.OnPush,
  imports: [ReactiveFormsModule, RouterLink, FieldError],
  templateUrl: './account.html',
  styleUrl: './account.scss',
})
export class AccountPage {
  private readonly api = inject(Api);
  private readonly router = inject(Router);
  private readonly notices = inject(NoticeBoard);
  protected readonly session = inject(Session);
  protected readonly preferences = inject(Preferences);
  protected readonly themes = THEMES;
  /** Places the phone's bar has no room for. */
  protected readonly morePlaces = computed(() => placesFor(this.session.roles()).slice(4));

  protected readonly busy = signal(false);
  protected readonly problem = signal<string | null>(null);
  private readonly errors = signal<Readonly<Record<string, string>>>({});
  protected readonly form = new FormGroup({
    current: new FormControl('', { nonNullable: true }),
    next: new FormControl('', { nonNullable: true }),
  });

  protected error(field: string): string | null {
    return fieldError(this.errors(), field);
  }

  protected changePassword(): void {
    if (this.busy()) return;
    const parsed = changePasswordRequestSchema.safeParse(this.form.getRawValue());
    this.errors.set(contractErrors(parsed));
    this.problem.set(null);
    if (!parsed.success) return;
    this.busy.set(true);
    this.api.put('/account/password', parsed.data, z.unknown()).subscribe({
      next: () => {
        this.busy.set(false);
        this.form.reset();
        this.notices.done('Password changed. Other places you were signed in are signed out.');
      },
      error: (error: unknown) => {
        this.busy.set(false);
        this.problem.set(ApiProblem.from(error).words);
      },
    });
  }

  protected signOut(): void {
    this.session.signOut().subscribe({
      next: () => void this.router.navigateByUrl('/sign-in'),
      error: (error: unknown) => this.notices.problem(ApiProblem.from(error).words),
    });
  }
}
