import { ChangeDetectionStrategy, Component, computed, inject, signal } from '@angular/core';
import { RouterLink } from '@angular/router';
import { Role } from '../../../../shared/contracts/common';
import { Waiting, WaitingGroup, waitingSchema } from '../../../../shared/contracts/waiting';
import { Api } from '../../core/api';
import { Session } from '../../core/session';
import { GapScaleHead } from '../../ui/gap-rule';
import { load } from '../../ui/loading/load';
import { WaitingFor } from '../../ui/loading/waiting-for';
import { MomentPipe } from '../../ui/moment/moment-pipe';
import { domainsOf } from '../verdict-line/domains';
import { VerdictLine } from '../verdict-line/verdict-line';

const GROUP_WORDS: Record<WaitingGroup['code'], { readonly head: string; readonly note: string }> = {
  'to sign': { head: 'For you to sign', note: 'submitted by an analyst' },
  'sent back': { head: 'Sent back to you', note: 'with a note from the lead' },
  'to submit': { head: 'For you to submit', note: 'judged, not yet submitted' },
  'needs runs': { head: 'Waiting for runs', note: 'studies that cannot be judged yet' },
  differs: { head: 'Re-runs that differ', note: 'look at these first' },
  'not re-run': { head: 'Signed, not re-run yet', note: 'no auditor has recomputed these' },
  invited: { head: 'Invited, not here yet', note: 'their link is in the outbox' },
  moving: { head: 'Moving without you', note: 'nothing for you to do' },
};

/** What waits for this person, by role. */
@Component({
  selector: 'tm-waiting',
  changeDetection: ChangeDetectionStrategy.OnPush,
  imports: [RouterLink, WaitingFor, VerdictLine, GapScaleHead, MomentPipe],
  templateUrl: './waiting.html',
  styleUrl: './waiting.scss',
})
export class WaitingPage {
  private readonly api = inject(Api);
  protected readonly session = inject(Session);
  protected readonly waiting = load(() => this.api.get('/waiting', waitingSchema));
  private readonly chosen = signal<Role | null>(null);

  protected readonly roles = computed<Waiting['roles']>(() => this.waiting.value()?.roles ?? []);
  protected readonly shown = computed(
    () => this.roles().find(({ role }) => role === this.chosen()) ?? this.roles()[0] ?? null,
  );
  protected readonly groups = computed(() =>
    (this.shown()?.groups ?? []).filter(({ items }) => items.length > 0),
  );
  /** One scale for the whole list, a separate one for gaps in K/W. */
  protected readonly domains = computed(() =>
    domainsOf(
      this.groups()
        .flatMap(({ items }) => items)
        .flatMap((item) => (item.kind === 'verdict' ? [item.verdict] : [])),
    ),
  );
  protected readonly hasVerdicts = computed(() =>
    this.groups().some(({ items }) => items.some(({ kind }) => kind === 'verdict')),
  );
  protected readonly headline = computed(() => {
    const count = this.shown()?.count ?? 0;
    if (count === 0) return 'Nothing waits for you';
    return count === 1 ? '1 thing waits for you' : `${count} things wait for you`;
  });
  protected readonly words = GROUP_WORDS;

  protected choose(role: Role): void {
    this.chosen.set(role);
  }
}
