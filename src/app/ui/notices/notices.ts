import { ChangeDetectionStrategy, Component, inject } from '@angular/core';
import { NoticeBoard } from './notice-board';

/** Where notices are shown and read out. */
@Component({
  selector: 'tm-notices',
  changeDetection: ChangeDetectionStrategy.OnPush,
  template: `
    <div class="board" role="status" aria-live="polite">
      @for (notice of board.notices(); track notice.id) {
        <p [class.problem]="notice.kind === 'problem'">
          {{ notice.text }}
          <button type="button" class="button text small" (click)="board.close(notice.id)">Close</button>
        </p>
      }
    </div>
  `,
  styles: `
    .board {
      position: fixed;
      right: 16px;
      bottom: 84px;
      z-index: 10;
      display: grid;
      gap: 8px;
      max-width: min(480px, calc(100vw - 32px));
    }
    p {
      display: flex;
      align-items: center;
      justify-content: space-between;
      gap: 12px;
      padding: 6px 8px 6px 14px;
      border: 1px solid var(--edge);
      border-left: 3px solid var(--ink);
      border-radius: 4px;
      background: var(--plate);
    }
    .problem {
      border-left-color: var(--stop);
    }
    @media (max-width: 720px) {
      .board {
        bottom: 136px;
      }
    }
    @media print {
      .board {
        display: none;
      }
    }
  `,
})
export class Notices {
  protected readonly board = inject(NoticeBoard);
}
