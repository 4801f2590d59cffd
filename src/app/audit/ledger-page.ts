import { ChangeDetectionStrategy, Component, computed, DOCUMENT, inject, input, signal } from '@angular/core';
import { RouterLink } from '@angular/router';
import { forkJoin } from 'rxjs';
import { LedgerEntry } from '../../../shared/contracts/ledger';
import { ApiProblem } from '../core/api-problem';
import { FindingMark } from '../ui/findings/finding-mark';
import { load } from '../ui/loading/load';
import { WaitingFor } from '../ui/loading/waiting-for';
import { MomentPipe } from '../ui/moment/moment-pipe';
import { NoticeBoard } from '../ui/notices/notice-board';
import { shortDigest } from '../verdicts/verdict-words';
import { AuditClient } from './audit-client';
import { AuditTabs } from './audit-tabs';
import { saveFile } from '../ui/save-file/save-file';

const PAGE_SIZE = 50;

/** Kinds of subject that have a page of their own. */
const PLACES: Readonly<Record<string, string>> = { verdict: '/verdicts', study: '/studies' };

/** The chained record of the team: whether it is whole, and every entry. */
@Component({
  selector: 'tm-ledger-page',
  imports: [AuditTabs, FindingMark, MomentPipe, RouterLink, WaitingFor],
  templateUrl: './ledger-page.html',
  styleUrl: './ledger-page.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class LedgerPage {
  private readonly client = inject(AuditClient);
  private readonly notices = inject(NoticeBoard);
  private readonly document = inject(DOCUMENT);

  /** Page of the list, from the address. */
  readonly page = input<string>();

  protected readonly pageNumber = computed(() => Math.max(1, Math.floor(Number(this.page())) || 1));
  protected readonly entries = load(() => this.client.ledger(this.pageNumber(), PAGE_SIZE));
  protected readonly check = load(() => this.client.check());
  protected readonly pages = computed(() =>
    Math.max(1, Math.ceil((this.entries.value()?.total ?? 0) / PAGE_SIZE)),
  );
  protected readonly exporting = signal(false);

  protected readonly headline = computed(() => {
    const check = this.check.value();
    if (check === null) return 'The ledger';
    if (check.entries === 0) return 'The ledger is empty';
    return check.whole
      ? `The ledger is whole: ${check.entries} ${check.entries === 1 ? 'entry' : 'entries'}`
      : `The ledger is broken at entry ${check.brokenAt ?? 'unknown'}`;
  });
  protected readonly detail = computed(() =>
    this.check.value()?.whole === false
      ? 'That entry or the one before it was changed after it was written. Entries before it still fit.'
      : 'Every entry carries a digest of itself and of the one before, so a later change would show.',
  );

  protected short(digest: string): string {
    return shortDigest(digest);
  }

  protected placeOf({ subject }: LedgerEntry): string[] | null {
    const place = PLACES[subject.kind];
    return place ? [place, subject.id] : null;
  }

  protected contentOf({ content }: LedgerEntry): string {
    return JSON.stringify(content, null, 2);
  }

  protected async copy(digest: string): Promise<void> {
    try {
      await this.document.defaultView?.navigator.clipboard.writeText(digest);
      this.notices.done('Digest copied. Keep it outside this server.');
    } catch {
      this.notices.problem('Copying is blocked here; mark the digest and copy it by hand.');
    }
  }

  protected exportLedger(): void {
    if (this.exporting()) return;
    this.exporting.set(true);
    forkJoin([this.client.wholeLedger(), this.client.check()]).subscribe({
      next: ([entries, check]) => {
        this.exporting.set(false);
        const json = JSON.stringify({ check, entries }, null, 2);
        saveFile(this.document, 'tenthmark-ledger.json', new Blob([json], { type: 'application/json' }));
      },
      error: (error: unknown) => {
        this.exporting.set(false);
        this.notices.problem(ApiProblem.from(error).words);
      },
    });
  }
}
