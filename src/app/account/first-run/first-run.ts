import { ChangeDetectionStrategy, Component, inject, signal } from '@angular/core';
import { FormControl, FormGroup, ReactiveFormsModule, Validators } from '@angular/forms';
import { Router } from '@angular/router';
import { firstRunRequestSchema } from '../../../../shared/contracts/accounts';
import { ApiProblem } from '../../core/api-problem';
import { Session } from '../../core/session';
import { FieldError } from '../../ui/field-error/field-error';
import { contractErrors, fieldError } from '../../ui/field-error/contract-errors';
import { EntryFrame } from '../entry-frame/entry-frame';

const text = () => new FormControl('', { nonNullable: true, validators: [Validators.required] });

/** An empty database asks for its first administrator, who then adds everyone else. */
@Component({
  selector: 'tm-first-run',
  changeDetection: ChangeDetectionStrategy.OnPush,
  imports: [ReactiveFormsModule, EntryFrame, FieldError],
  template: `
    <tm-entry-frame heading="No one is here yet. The first account is the administrator of a new team.">
      <form [formGroup]="form" (ngSubmit)="begin()" novalidate>
        <div class="field">
          <label for="team">Team</label>
          <input id="team" formControlName="team" autocomplete="organization" aria-describedby="team-error" />
          <tm-field-error id="team-error" [text]="error('team')" />
        </div>
        <div class="field">
          <label for="name">Your name</label>
          <input id="name" formControlName="name" autocomplete="name" aria-describedby="name-error" />
          <tm-field-error id="name-error" [text]="error('name')" />
        </div>
        <div class="field">
          <label for="email">E-mail address</label>
          <input
            id="email"
            type="email"
            formControlName="email"
            autocomplete="username"
            aria-describedby="email-error"
          />
          <tm-field-error id="email-error" [text]="error('email')" />
        </div>
        <div class="field">
          <label for="password">Password</label>
          <input
            id="password"
            type="password"
            formControlName="password"
            autocomplete="new-password"
            aria-describedby="password-hint password-error"
          />
          <span class="hint" id="password-hint">At least 12 characters.</span>
          <tm-field-error id="password-error" [text]="error('password')" />
        </div>
        @if (problem(); as words) {
          <p class="problem" role="alert">{{ words }}</p>
        }
        <button type="submit" class="button fill" [attr.aria-disabled]="busy()">Make the team</button>
      </form>
    </tm-entry-frame>
  `,
  styles: `
    form {
      display: grid;
      gap: 16px;
      justify-items: stretch;
    }
    .button {
      justify-self: start;
    }
    .problem {
      color: var(--stop);
    }
  `,
})
export class FirstRun {
  private readonly router = inject(Router);
  private readonly session = inject(Session);
  protected readonly problem = signal<string | null>(null);
  protected readonly busy = signal(false);
  private readonly errors = signal<Readonly<Record<string, string>>>({});
  protected readonly form = new FormGroup({ team: text(), name: text(), email: text(), password: text() });

  protected error(field: string): string | null {
    return fieldError(this.errors(), field);
  }

  protected begin(): void {
    if (this.busy()) return;
    const parsed = firstRunRequestSchema.safeParse(this.form.getRawValue());
    this.errors.set(contractErrors(parsed));
    if (!parsed.success) return;
    this.busy.set(true);
    this.session.firstRun(parsed.data).subscribe({
      next: () => void this.router.navigateByUrl('/'),
      error: (error: unknown) => {
        this.busy.set(false);
        this.problem.set(ApiProblem.from(error).words);
      },
    });
  }
}
