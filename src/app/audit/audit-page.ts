import {
  ChangeDetectionStrategy,
  Component,
  computed,
  DestroyRef,
  DOCUMENT,
  inject,
  signal,
} from '@angular/core';
import { takeUntilDestroyed } from '@angular/core/rxjs-interop';
import { RouterLink } from '@angular/router';
import { forkJoin, map } from 'rxjs';
import { VerdictRow } from '../../../shared/contracts/verdicts';
import { Session } from '../core/session';
import { FindingMark } from '../ui/findings/finding-mark';
import { NeedleMark } from '../ui/gap-rule';
import { load } from '../ui/loading/load';
import { WaitingFor } from '../ui/loading/waiting-for';
import { DayPipe, MomentPipe } from '../ui/moment/moment-pipe';
import { NoticeBoard } from '../ui/notices/notice-board';
import { conditionInWords } from '../verdicts/verdict-words';
import { AuditClient } from './audit-client';
import { AuditRow, auditRow, RowResult } from './audit-row';
import { AuditTabs } from './audit-tabs';
import { batchInWords, listInWords } from './batch-words';
import { BatchTicks, TickState } from './batch-ticks';
import { Compare } from './compare';
import { ReRunBatch } from './re-run-batch';
import { asCsv, saveFile } from '../ui/save-file/save-file';

/** Rows added at a time, so that thousands of verdicts do not stall the page. */
const ROWS_SHOWN = 100;

/** Past verdicts recomputed from their stored logs: identical, or exactly what differs. */
@Component({
  selector: 'tm-audit-page',
  imports: [
    AuditTabs,
    BatchTicks,
    Compare,
    DayPipe,
    FindingMark,
    MomentPipe,
    NeedleMark,
    RouterLink,
    WaitingFor,
  ],
  providers: [ReRunBatch],
  templateUrl: './audit-page.html',
  styleUrl: './audit-page.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class AuditPage {
  private readonly client = inject(AuditClient);
  private readonly notices = inject(NoticeBoard);
  private readonly document = inject(DOCUMENT);
  private readonly destroyRef = inject(DestroyRef);
  protected readonly batch = inject(ReRunBatch);
  protected readonly mayReRun = computed(() => this.session.has('auditor', 'lead'));
  private readonly session = inject(Session);

  protected readonly fetched = load(() =>
    forkJoin([this.client.verdicts('signed off'), this.client.verdicts('submitted')]).pipe(
      map(([signed, submitted]) =>
        [...signed, ...submitted].sort((one, other) => other.stateSince.localeCompare(one.stateSince)),
      ),
    ),
  );

  protected readonly state = signal<'both' | 'signed off' | 'submitted'>('both');
  protected readonly result = signal<RowResult['kind'] | 'all'>('all');
  protected readonly method = signal('any');
  protected readonly limit = signal(ROWS_SHOWN);
  protected readonly compared = signal<string | null>(null);

  private readonly rows = computed(() =>
    (this.fetched.value() ?? []).map((verdict) => auditRow(verdict, this.batch.outcomes().get(verdict.id))),
  );
  protected readonly methods = computed(() =>
    [...new Set(this.rows().map(({ verdict }) => verdict.method))].sort(),
  );
  protected readonly chosen = computed(() =>
    this.rows().filter(
      ({ verdict, result }) =>
        (this.state() === 'both' || verdict.state === this.state()) &&
        (this.result() === 'all' || result.kind === this.result()) &&
        (this.method() === 'any' || verdict.method === this.method()),
    ),
  );
  protected readonly shown = computed(() => this.chosen().slice(0, this.limit()));
  protected readonly empty = computed(() => this.fetched.value()?.length === 0);

  protected readonly head = computed(() =>
    this.batch.queue().length > 0
      ? batchInWords(this.batch, this.inBatch())
      : listInWords(this.rows().map(({ result }) => result)),
  );
  private readonly inBatch = computed(() => {
    const results = new Map(this.rows().map(({ verdict, result }) => [verdict.id, result]));
    return this.batch
      .queue()
      .slice(0, this.batch.done())
      .map((id) => results.get(id))
      .filter((result) => result !== undefined);
  });
  protected readonly ticks = computed<TickState[]>(() => {
    const done = this.inBatch();
    return this.batch
      .queue()
      .map((id, place) =>
        place < done.length
          ? (done[place].level ?? 'waiting')
          : id === this.batch.current()
            ? 'now'
            : 'waiting',
      );
  });

  protected reRun(verdicts: readonly VerdictRow[]): void {
    this.batch
      .start(verdicts.map(({ id }) => id))
      .pipe(takeUntilDestroyed(this.destroyRef))
      .subscribe({ complete: () => this.notices.done(this.head().headline + '.') });
  }

  protected reRunChosen(): void {
    this.reRun(this.chosen().map(({ verdict }) => verdict));
  }

  protected compare({ verdict }: AuditRow): void {
    this.compared.update((id) => (id === verdict.id ? null : verdict.id));
  }

  protected showMore(): void {
    this.limit.update((limit) => limit + ROWS_SHOWN);
  }

  protected condition({ condition, metric }: VerdictRow): string {
    return `${conditionInWords(condition)}, ${metric}`;
  }

  protected exportTable(): void {
    const head = [
      'study',
      'condition',
      'metric',
      'unit',
      'state',
      'since',
      'a',
      'b',
      'gap',
      'margin of error',
      'gap ÷ margin',
      'headline',
      'method',
      'thresholds set',
      'last re-run',
      'result',
      'verdict id',
    ];
    const rows = this.chosen().flatMap(({ verdict, result }) =>
      verdict.pairs.map((pair) => [
        verdict.study.name,
        verdict.condition.name,
        verdict.metric,
        verdict.unit,
        verdict.state,
        verdict.stateSince,
        pair.a,
        pair.b,
        pair.gap,
        pair.marginOfError,
        pair.clearance,
        pair.headline,
        verdict.method,
        verdict.thresholdsNumber,
        result.reRun?.at ?? verdict.lastReRun?.at ?? null,
        result.kind === 'none' ? 'not re-run' : result.kind,
        verdict.id,
      ]),
    );
    const csv = new Blob([asCsv([head, ...rows])], { type: 'text/csv;charset=utf-8' });
    saveFile(this.document, 'tenthmark-audit.csv', csv);
  }
}
