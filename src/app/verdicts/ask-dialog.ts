import { DIALOG_DATA, DialogRef } from '@angular/cdk/dialog';
import { ChangeDetectionStrategy, Component, inject, signal } from '@angular/core';
import { NonNullableFormBuilder, ReactiveFormsModule, ValidatorFn, Validators } from '@angular/forms';
import { Observable } from 'rxjs';
import { ApiProblem } from '../core/api-problem';

export interface Answer {
  readonly comment: string | null;
  readonly choice: string | null;
}

/** A question before an act. The act runs while the dialog is open, so that a refusal keeps what was typed. */
export interface Question<Result> {
  readonly title: string;
  readonly lines: readonly string[];
  readonly confirm: string;
  readonly comment: { readonly label: string; readonly required: boolean };
  readonly choice?: {
    readonly label: string;
    readonly none: string;
    readonly options: readonly { readonly value: string; readonly label: string }[];
  };
  act(answer: Answer): Observable<Result>;
}

const LENGTH: ValidatorFn = (control) => Validators.maxLength(2000)(control);
/** At least a few words, as the contract asks of a reason. */
const REASON: ValidatorFn = (control) =>
  LENGTH(control) ?? (String(control.value).trim().length < 3 ? { required: true } : null);

/** Asks before an act on a verdict and carries it out. Closes with the act's result, or with nothing. */
@Component({
  selector: 'tm-ask-dialog',
  imports: [ReactiveFormsModule],
  templateUrl: './ask-dialog.html',
  styleUrl: './ask-dialog.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class AskDialog<Result> {
  protected readonly question = inject<Question<Result>>(DIALOG_DATA);
  protected readonly working = signal(false);
  protected readonly problem = signal<string | null>(null);
  private readonly ref = inject<DialogRef<Result>>(DialogRef);

  protected readonly form = inject(NonNullableFormBuilder).group({
    comment: ['', this.question.comment.required ? REASON : LENGTH],
    choice: [''],
  });

  protected leave(): void {
    this.ref.close();
  }

  protected carryOut(): void {
    this.form.markAllAsTouched();
    if (this.form.invalid || this.working()) return;
    const { comment, choice } = this.form.getRawValue();
    this.working.set(true);
    this.problem.set(null);
    this.question.act({ comment: comment.trim() || null, choice: choice || null }).subscribe({
      next: (result) => this.ref.close(result),
      error: (error: unknown) => {
        this.working.set(false);
        this.problem.set(ApiProblem.from(error).words);
      },
    });
  }
}
