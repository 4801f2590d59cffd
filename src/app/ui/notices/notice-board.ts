import { Injectable, signal } from '@angular/core';

export interface Notice {
  readonly id: number;
  readonly text: string;
  readonly kind: 'done' | 'problem';
}

const SECONDS_SHOWN = 6;

/** Short messages about what was done. What went wrong stays until it is closed. */
@Injectable({ providedIn: 'root' })
export class NoticeBoard {
  private next = 1;
  readonly notices = signal<readonly Notice[]>([]);

  done(text: string): void {
    const id = this.post(text, 'done');
    setTimeout(() => this.close(id), SECONDS_SHOWN * 1000);
  }

  problem(text: string): void {
    this.post(text, 'problem');
  }

  close(id: number): void {
    this.notices.update((notices) => notices.filter((notice) => notice.id !== id));
  }

  private post(text: string, kind: Notice['kind']): number {
    const id = this.next++;
    this.notices.update((notices) => [...notices, { id, text, kind }]);
    return id;
  }
}
