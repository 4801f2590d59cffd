import { ChangeDetectionStrategy, Component, inject, input, signal } from '@angular/core';
import { FormControl, ReactiveFormsModule } from '@angular/forms';
import { Router } from '@angular/router';
import { passwordSchema } from '../../../../shared/contracts/accounts';
import { ApiProblem } from '../../core/api-problem';
import { Session } from '../../core/session';
import { EntryFrame } from '../entry-frame/entry-frame';

/** An invited person chooses a password and is in. */
@Component({
  selector: 'tm-welcome',
  changeDetection: ChangeDetectionStrategy.OnPush,
  imports: [ReactiveFormsModule, EntryFrame],
  template: `
    <tm-entry-frame heading="You were invited. Choose a password to come in.">
      <form (submit)="accept($event)" novalidate>
        <div class="field">
          <label for="password">New password</label>
          <input
            id="password"
            type="password"
            autocomplete="new-password"
            [formControl]="password"
            aria-describedby="password-hint password-problem"
          />
          <span class="hint" id="password-hint">At least 12 characters.</span>
        </div>
        <p class="problem" id="password-problem" role="alert">{{ problem() }}</p>
        <button type="submit" class="button fill" [attr.aria-disabled]="busy()">Set the password</button>
      </form>
    </tm-entry-frame>
  `,
  styles: `
    form {
      display: grid;
      gap: 14px;
    }
    .button {
      justify-self: start;
    }
    .problem {
      color: var(--stop);
    }
    .problem:empty {
      display: none;
    }
  `,
})
export class Welcome {
  private readonly router = inject(Router);
  private readonly session = inject(Session);
  readonly token = input.required<string>();
  protected readonly password = new FormControl('', { nonNullable: true });
  protected readonly problem = signal('');
  protected readonly busy = signal(false);

  protected accept(event: Event): void {
    event.preventDefault();
    if (this.busy()) return;
    const parsed = passwordSchema.safeParse(this.password.value);
    this.problem.set(parsed.success ? '' : parsed.error.issues[0].message);
    if (!parsed.success) return;
    this.busy.set(true);
    this.session.acceptInvitation({ token: this.token(), password: parsed.data }).subscribe({
      next: () => void this.router.navigateByUrl('/'),
      error: (error: unknown) => {
        this.busy.set(false);
        this.problem.set(ApiProblem.from(error).words);
      },
    });
  }
}
