import { computed, Injectable, inject, signal } from '@angular/core';
import { catchError, concatMap, from, map, Observable, of, takeWhile, tap } from 'rxjs';
import { ReRun } from '../../../shared/contracts/verdicts';
import { ApiProblem } from '../core/api-problem';
import { AuditClient } from './audit-client';

/** What became of one verdict of a batch: its re-run, or the reason the server gave for none. */
export type ReRunOutcome =
  { readonly kind: 'done'; readonly reRun: ReRun } | { readonly kind: 'failed'; readonly text: string };

/** Re-runs verdicts one after the other, so that a bench server is never asked for more than one at a time. */
@Injectable()
export class ReRunBatch {
  private readonly client = inject(AuditClient);

  /** By verdict, over all batches while the page is open. */
  readonly outcomes = signal<ReadonlyMap<string, ReRunOutcome>>(new Map());
  /** The verdicts of the batch under way or of the last one, in their order. */
  readonly queue = signal<readonly string[]>([]);
  readonly current = signal<string | null>(null);
  readonly stopping = signal(false);
  private readonly finished = signal(0);
  private readonly milliseconds = signal(0);

  readonly running = computed(() => this.current() !== null);
  readonly done = this.finished.asReadonly();
  /** Seconds the rest will take if it goes on as so far; null until one is done. */
  readonly secondsLeft = computed(() => {
    const [done, total] = [this.finished(), this.queue().length];
    return done === 0 ? null : ((total - done) * this.milliseconds()) / done / 1000;
  });

  /** Starts a batch and completes when it is through or was stopped. A batch under way goes on undisturbed. */
  start(ids: readonly string[]): Observable<unknown> {
    if (this.running() || ids.length === 0) return of(null);
    this.queue.set(ids);
    this.finished.set(0);
    this.milliseconds.set(0);
    this.stopping.set(false);
    this.current.set(ids[0]);
    return from(ids).pipe(
      takeWhile(() => !this.stopping()),
      concatMap((id) => (this.stopping() ? of(null) : this.one(id))),
      tap({ complete: () => this.end(), error: () => this.end(), unsubscribe: () => this.end() }),
    );
  }

  /** Lets the verdict under way finish, then stops. */
  stop(): void {
    this.stopping.set(true);
  }

  private one(id: string): Observable<unknown> {
    this.current.set(id);
    const started = performance.now();
    return this.client.reRun(id).pipe(
      map((reRun): ReRunOutcome => ({ kind: 'done', reRun })),
      // One verdict that fails spoils no other.
      catchError((error: unknown) =>
        of<ReRunOutcome>({ kind: 'failed', text: ApiProblem.from(error).words }),
      ),
      tap((outcome) => {
        this.outcomes.update((outcomes) => new Map(outcomes).set(id, outcome));
        this.finished.update((count) => count + 1);
        this.milliseconds.update((sum) => sum + performance.now() - started);
      }),
    );
  }

  private end(): void {
    this.current.set(null);
    this.stopping.set(false);
  }
}
