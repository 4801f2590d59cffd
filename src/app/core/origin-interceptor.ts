import { HttpInterceptorFn } from '@angular/common/http';

/** Marks every change as asked for by this page; another site's form cannot set this header. */
export const originInterceptor: HttpInterceptorFn = (request, next) =>
  next(request.method === 'GET' ? request : request.clone({ setHeaders: { 'x-tenthmark': '1' } }));
