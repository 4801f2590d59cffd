import { HttpClient, HttpParams } from '@angular/common/http';
import { inject, Injectable } from '@angular/core';
import { map, Observable } from 'rxjs';
import * as z from 'zod';

type Query = Record<string, string | number | boolean | undefined>;

/** The way to the server. Every answer passes its contract before it has a type. */
@Injectable({ providedIn: 'root' })
export class Api {
  private readonly http = inject(HttpClient);

  get<T extends z.ZodType>(path: string, answer: T, query: Query = {}): Observable<z.infer<T>> {
    const given = Object.entries(query).filter(([, value]) => value !== undefined && value !== '');
    const params = new HttpParams({ fromObject: Object.fromEntries(given) as Record<string, string> });
    return this.http.get<unknown>(`/api${path}`, { params }).pipe(map((body) => answer.parse(body)));
  }

  post<T extends z.ZodType>(path: string, body: unknown, answer: T): Observable<z.infer<T>> {
    return this.http.post<unknown>(`/api${path}`, body).pipe(map((received) => answer.parse(received)));
  }

  patch<T extends z.ZodType>(path: string, body: unknown, answer: T): Observable<z.infer<T>> {
    return this.http.patch<unknown>(`/api${path}`, body).pipe(map((received) => answer.parse(received)));
  }

  put<T extends z.ZodType>(path: string, body: unknown, answer: T): Observable<z.infer<T>> {
    return this.http.put<unknown>(`/api${path}`, body).pipe(map((received) => answer.parse(received)));
  }

  delete<T extends z.ZodType>(path: string, answer: T): Observable<z.infer<T>> {
    return this.http.delete<unknown>(`/api${path}`).pipe(map((received) => answer.parse(received)));
  }
}
