import { LogReply, LogRequest } from '../app/intake/log-messages';

/** Stands for the worker in component tests: requests are recorded, replies sent by the test. */
export class LogWorkerStub {
  static readonly made: LogWorkerStub[] = [];
  readonly requests: LogRequest[] = [];
  onmessage: ((event: { data: LogReply }) => void) | null = null;

  constructor() {
    LogWorkerStub.made.push(this);
  }

  postMessage(request: LogRequest): void {
    this.requests.push(request);
  }

  answer(data: LogReply): void {
    this.onmessage?.({ data });
  }

  terminate(): void {
    this.onmessage = null;
  }
}

export const makeLogWorker = (): LogWorkerStub => new LogWorkerStub();
