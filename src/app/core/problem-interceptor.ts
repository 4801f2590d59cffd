import { HttpInterceptorFn } from '@angular/common/http';
import { catchError, throwError } from 'rxjs';
import { ApiProblem } from './api-problem';

/** Turns every failure into one shape, so that pages say what happened and what to do. */
export const problemInterceptor: HttpInterceptorFn = (request, next) =>
  next(request).pipe(catchError((error: unknown) => throwError(() => ApiProblem.from(error))));
