import { computed, Signal, signal } from '@angular/core';
import { takeUntilDestroyed, toObservable } from '@angular/core/rxjs-interop';
import { catchError, map, Observable, of, startWith, switchMap } from 'rxjs';
import { ApiProblem } from '../../core/api-problem';

/** The states of anything fetched: asked for, failed with a next step, or here (empty is a kind of here). */
export type LoadState<T> =
  | { readonly state: 'loading' }
  | { readonly state: 'failed'; readonly problem: ApiProblem }
  | { readonly state: 'ready'; readonly value: T };

export interface Load<T> {
  readonly state: Signal<LoadState<T>>;
  /** The newest value; kept while it is asked for again. */
  readonly value: Signal<T | null>;
  reload(): void;
  /** Puts in a value the server just answered a change with. */
  put(value: T): void;
}

/**
 * Fetches `source()` again whenever a signal it reads changes, or on `reload`. Call while a component is made.
 */
export function load<T>(source: () => Observable<T>): Load<T> {
  const asked = signal(0);
  const state = signal<LoadState<T>>({ state: 'loading' });
  const value = signal<T | null>(null);
  const request = computed(() => {
    asked();
    return source();
  });
  toObservable(request)
    .pipe(
      switchMap((stream) =>
        stream.pipe(
          map((received): LoadState<T> => ({ state: 'ready', value: received })),
          catchError((error: unknown) =>
            of<LoadState<T>>({ state: 'failed', problem: ApiProblem.from(error) }),
          ),
          startWith<LoadState<T>>({ state: 'loading' }),
        ),
      ),
      takeUntilDestroyed(),
    )
    .subscribe((next) => {
      state.set(next);
      if (next.state === 'ready') value.set(next.value);
    });
  return {
    state: state.asReadonly(),
    value: value.asReadonly(),
    reload: () => asked.update((count) => count + 1),
    put: (received) => {
      value.set(received);
      state.set({ state: 'ready', value: received });
    },
  };
}
