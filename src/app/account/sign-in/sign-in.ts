import { ChangeDetectionStrategy, Component, inject, input, signal } from '@angular/core';
import { FormControl, FormGroup, ReactiveFormsModule, Validators } from '@angular/forms';
import { Router } from '@angular/router';
import { ApiProblem } from '../../core/api-problem';
import { Session } from '../../core/session';
import { EntryFrame } from '../entry-frame/entry-frame';

/** The first screen: who are you. With the demo loaded its sign-ins are one tap away. */
@Component({
  selector: 'tm-sign-in',
  changeDetection: ChangeDetectionStrategy.OnPush,
  imports: [ReactiveFormsModule, EntryFrame],
  templateUrl: './sign-in.html',
  styleUrl: './sign-in.scss',
})
export class SignIn {
  private readonly router = inject(Router);
  protected readonly session = inject(Session);

  /** Where the person was going. */
  readonly to = input<string>();

  protected readonly problem = signal<string | null>(null);
  protected readonly busy = signal(false);
  protected readonly form = new FormGroup({
    email: new FormControl('', { nonNullable: true, validators: [Validators.required, Validators.email] }),
    password: new FormControl('', { nonNullable: true, validators: [Validators.required] }),
  });

  protected fill(email: string, password: string): void {
    this.form.setValue({ email, password });
    this.signIn();
  }

  protected signIn(): void {
    if (this.busy()) return;
    if (this.form.invalid) {
      this.form.markAllAsTouched();
      this.problem.set('Give your e-mail address and password.');
      return;
    }
    this.busy.set(true);
    this.problem.set(null);
    this.session.signIn(this.form.getRawValue()).subscribe({
      next: () => {
        // Only addresses of our own: a crafted link must not lead elsewhere.
        const to = this.to();
        void this.router.navigateByUrl(to && /^\/(?![/\\])/.test(to) ? to : '/');
      },
      error: (error: unknown) => {
        this.busy.set(false);
        this.problem.set(ApiProblem.from(error).words);
      },
    });
  }
}
