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
  /** Logs whose reading has not been answered yet. */
  private readonly pending = new Set<number>();

  constructor() {
    inject(DestroyRef).onDestroy(() => this.workers.forEach((worker) => worker.terminate()));
  }

  read(id: number, file: File, choices: LogChoices): void {
    const home = this.home.get(id);
    this.pending.add(id);
    // Read before, with other columns: the same worker reads it again.
    if (home) home.postMessage({ kind: 'read', id, file, choices });
    else this.queue.push({ id, file, choices });
    this.next();
  }

  /** Answers from memory, or reads the file again when its reader is gone. */
  reduce(id: number, file: File, choices: LogChoices): void {
    const home = this.home.get(id);
    if (home) home.postMessage({ kind: 'reduce', id, choices });
    else if (!this.pending.has(id)) this.read(id, file, choices);
  }

  forget(id: number): void {
    const waiting = this.queue.findIndex((job) => job.id === id);
    if (waiting >= 0) this.queue.splice(waiting, 1);
    this.pending.delete(id);
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
      const ended = data.kind === 'read' || data.kind === 'failed';
      // Left out while it was read: its answer is no longer wanted.
      if (this.home.has(data.id)) {
        if (ended) this.pending.delete(data.id);
        this.replySubject.next(data);
      }
      if (ended && !this.idle.includes(worker)) {
        this.idle.push(worker);
        this.next();
      }
    };
    worker.onerror = () => this.broke(worker);
    this.workers.push(worker);
    return worker;
  }

  /** A reader that could not start or broke down: the log it read says so, the others go on with another reader. */
  private broke(worker: Worker): void {
    worker.terminate();
    this.workers.splice(this.workers.indexOf(worker), 1);
    if (this.idle.includes(worker)) this.idle.splice(this.idle.indexOf(worker), 1);
    for (const [id, home] of [...this.home]) {
      if (home !== worker) continue;
      this.home.delete(id);
      if (this.pending.delete(id))
        this.replySubject.next({ kind: 'failed', id, text: 'The reader stopped. Drop the file again.' });
    }
    this.next();
  }
}
