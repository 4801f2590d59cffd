import { DestroyRef, inject, Injectable } from '@angular/core';
import { Observable, Subject } from 'rxjs';
import { LogChoices, LogReply } from './log-messages';
import { makeLogWorker } from './log-worker-factory';

interface Job {
  readonly id: number;
  readonly file: File;
  readonly choices: LogChoices;
}

/** As many readers as cores less one, so that the page keeps one for itself. */
const readersFor = (cores: number): number => Math.max(1, cores - 1);

/**
 * Reads logs in web workers, first come first served. A log stays with the worker that read it, which answers later changes of
 * window or ambient from memory.
 */
@Injectable()
export class LogReaders {
  private readonly replySubject = new Subject<LogReply>();
  readonly replies: Observable<LogReply> = this.replySubject.asObservable();
  private readonly workers: Worker[] = [];
  private readonly idle: Worker[] = [];
  private readonly queue: Job[] = [];
  private readonly home = new Map<number, Worker>();

  constructor() {
    inject(DestroyRef).onDestroy(() => this.workers.forEach((worker) => worker.terminate()));
  }

  read(id: number, file: File, choices: LogChoices): void {
    const home = this.home.get(id);
    // Read before, with other columns: the same worker reads it again.
    if (home) home.postMessage({ kind: 'read', id, file, choices });
    else this.queue.push({ id, file, choices });
    this.next();
  }

  reduce(id: number, choices: LogChoices): void {
    this.home.get(id)?.postMessage({ kind: 'reduce', id, choices });
  }

  forget(id: number): void {
    const waiting = this.queue.findIndex((job) => job.id === id);
    if (waiting >= 0) this.queue.splice(waiting, 1);
    this.home.get(id)?.postMessage({ kind: 'forget', id });
    this.home.delete(id);
  }

  private next(): void {
    while (this.queue.length > 0) {
      const worker = this.idle.pop() ?? this.another();
      if (!worker) return;
      const job = this.queue.shift();
      if (!job) return;
      this.home.set(job.id, worker);
      worker.postMessage({ kind: 'read', ...job });
    }
  }

  private another(): Worker | null {
    if (this.workers.length >= readersFor(navigator.hardwareConcurrency || 2)) return null;
    const worker = makeLogWorker();
    worker.onmessage = ({ data }: MessageEvent<LogReply>) => {
      this.replySubject.next(data);
      if ((data.kind === 'read' || data.kind === 'failed') && !this.idle.includes(worker)) {
        this.idle.push(worker);
        this.next();
      }
    };
    worker.onerror = () => {
      // A worker that could not start or broke down: its logs say so, the others go on.
      for (const [id, home] of this.home)
        if (home === worker)
          this.replySubject.next({ kind: 'failed', id, text: 'The reader stopped. Drop the file again.' });
    };
    this.workers.push(worker);
    return worker;
  }
}
