import { HttpErrorResponse } from '@angular/common/http';
import { Problem, problemSchema } from '../../../shared/contracts/common';

/** A failed request, in words a tester can act on. `status` 0: no answer at all. */
export class ApiProblem extends Error {
  constructor(
    readonly status: number,
    readonly code: string,
    title: string,
    readonly detail: string,
    readonly fields: NonNullable<Problem['fields']> = [],
  ) {
    super(title);
    this.name = 'ApiProblem';
  }

  /** What happened and what to do, in one line. */
  get words(): string {
    return this.detail ? `${this.message} ${this.detail}` : this.message;
  }

  static from(error: unknown): ApiProblem {
    if (error instanceof ApiProblem) return error;
    if (error instanceof HttpErrorResponse) {
      const parsed = problemSchema.safeParse(error.error);
      if (parsed.success) {
        const { status, code, title, detail, fields } = parsed.data;
        return new ApiProblem(status, code, title, detail ?? '', fields);
      }
      if (error.status === 0) {
        return new ApiProblem(
          0,
          'no-answer',
          'The server did not answer.',
          'What you entered is kept. Try again.',
        );
      }
      return new ApiProblem(
        error.status,
        'unexpected',
        'The server answered in a way this page cannot read.',
        'Load the page again.',
      );
    }
    const words = error instanceof Error ? error.message : String(error);
    return new ApiProblem(-1, 'unexpected', 'Something went wrong on this page.', words);
  }
}
