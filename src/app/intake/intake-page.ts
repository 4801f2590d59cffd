import {
  ChangeDetectionStrategy,
  Component,
  computed,
  effect,
  ElementRef,
  inject,
  input,
  signal,
  viewChild,
} from '@angular/core';
import { Router, RouterLink } from '@angular/router';
import { firstValueFrom, forkJoin } from 'rxjs';
import { ApiProblem } from '../core/api-problem';
import { Preferences } from '../core/preferences';
import { StudiesClient } from '../studies/studies-client';
import { load } from '../ui/loading/load';
import { WaitingFor } from '../ui/loading/waiting-for';
import { BatchTicks } from './batch-ticks';
import { BulkBar } from './bulk-bar/bulk-bar';
import { droppedFiles } from './dropped-files';
import { needsALook } from './dropped-log';
import { IntakeStore, OrderOfTesting } from './intake-store';
import { HoldsLogs } from './leave-guard';
import { LogDetail } from './log-detail/log-detail';
import { LogReaders } from './log-readers';
import { LogSender } from './log-sender';
import { LogTable } from './log-table/log-table';
import { sameNumbers } from './same-numbers';

/** Bringing runs into a study: drop many logs, look, assign, send, judge. */
@Component({
  selector: 'tm-intake',
  changeDetection: ChangeDetectionStrategy.OnPush,
  imports: [RouterLink, WaitingFor, BatchTicks, BulkBar, LogTable, LogDetail],
  providers: [LogReaders, IntakeStore, LogSender],
  templateUrl: './intake-page.html',
  styleUrl: './intake-page.scss',
  host: {
    // Of the document: a file dropped beside the page would take the browser away from it.
    '(document:dragover)': 'dragOver($event)',
    '(document:dragleave)': 'over.set(false)',
    '(document:drop)': 'drop($event)',
    '(document:keydown)': 'press($event)',
    '(window:beforeunload)': 'beforeUnload($event)',
  },
})
export class IntakePage implements HoldsLogs {
  private readonly client = inject(StudiesClient);
  private readonly router = inject(Router);
  private readonly sender = inject(LogSender);
  private readonly preferences = inject(Preferences);
  protected readonly store = inject(IntakeStore);
  private readonly chooser = viewChild<ElementRef<HTMLInputElement>>('chooser');
  private readonly bulk = viewChild(BulkBar);

  protected readonly orders: readonly OrderOfTesting[] = ['by their clocks', 'as listed', 'not known'];
  /** What follows from how the order is known. */
  protected readonly orderWords: Readonly<Record<OrderOfTesting, string>> = {
    'by their clocks': 'From the logs’ own dates and times. Used to look for drift over the session.',
    'as listed': 'You say that the runs stand below as they were run. Used to look for drift.',
    'not known': 'Drift over the session is not looked for.',
  };
  readonly id = input.required<string>();
  protected readonly setUp = load(() =>
    forkJoin({ study: this.client.study(this.id()), runs: this.client.runs(this.id()) }),
  );
  protected readonly study = computed(() => this.setUp.value()?.study ?? null);
  protected readonly over = signal(false);
  protected readonly sending = signal(false);
  protected readonly judging = signal(false);
  protected readonly problem = signal<string | null>(null);

  protected readonly toGo = computed(
    () => this.store.logs().filter(({ state }) => state === 'sending').length,
  );
  protected readonly stored = computed(() =>
    this.store.logs().filter(({ outcome }) => outcome?.outcome === 'stored'),
  );
  /** Logs whose stored numbers are not the ones seen here; there should be none. */
  protected readonly unlike = computed(() =>
    this.stored().filter(
      ({ outcome, readout }) =>
        outcome?.outcome === 'stored' &&
        !(readout?.summary && sameNumbers(readout.summary, outcome.run.summary)),
    ),
  );
  protected readonly countWords = computed(() => {
    const { all, waiting, reading, read } = this.store.counts();
    const parts = [`${read} read`];
    if (reading > 0) parts.push(`${reading} reading`);
    if (waiting > 0) parts.push(`${waiting} waiting`);
    return all === 0 ? 'No logs yet.' : `${all} ${all === 1 ? 'log' : 'logs'}: ${parts.join(', ')}.`;
  });
  /** One sentence on what keeps logs out. */
  protected readonly holdingBack = computed(() => {
    const missing = this.store.missing();
    const first = this.store.logs().find(({ id }) => missing.has(id));
    if (first)
      return `${first.file.name}: ${missing.get(first.id)}${missing.size > 1 ? `; ${missing.size - 1} more` : ''}.`;
    const look = this.store
      .logs()
      .filter(
        (log) =>
          log.state !== 'done' &&
          needsALook(log) &&
          (log.readout?.summary ?? null) === null &&
          log.state !== 'waiting' &&
          log.state !== 'reading',
      );
    if (look.length > 0)
      return `${look
        .map(({ file }) => file.name)
        .slice(0, 3)
        .join(', ')} ${look.length === 1 ? 'stays' : 'stay'} out until the problem is settled.`;
    return '';
  });
  protected readonly conditionsIn = computed(() => [
    ...new Set(this.stored().map(({ assignment }) => assignment.conditionId)),
  ]);

  constructor() {
    effect(() => {
      const setUp = this.setUp.value();
      if (setUp) this.store.begin(setUp.study, setUp.runs.runs);
    });
  }

  wouldLose(): boolean {
    return this.store
      .logs()
      .some(({ state, sameAs }) => state !== 'done' && state !== 'failed' && sameAs === null);
  }

  protected beforeUnload(event: BeforeUnloadEvent): void {
    if (this.wouldLose()) event.preventDefault();
  }

  protected dragOver(event: DragEvent): void {
    event.preventDefault();
    this.over.set(true);
  }

  protected drop(event: DragEvent): void {
    event.preventDefault();
    this.over.set(false);
    if (event.dataTransfer)
      droppedFiles(event.dataTransfer).then(
        (files) => this.store.add(files),
        () => this.problem.set('The folder could not be read. Drop its files instead.'),
      );
  }

  protected chooseOrder(how: string): void {
    this.store.chosenOrder.set(this.orders.find((one) => one === how) ?? null);
  }

  protected choose(): void {
    const field = this.chooser()?.nativeElement;
    this.store.add([...(field?.files ?? [])]);
    // The same file can then be chosen again.
    if (field) field.value = '';
  }

  protected async send(): Promise<void> {
    if (this.sending() || this.store.ready().length === 0) return;
    this.sending.set(true);
    this.problem.set(null);
    const whole = await this.sender.send(this.id(), this.store.ready());
    this.sending.set(false);
    if (!whole) this.problem.set('Not every log was sent. Those that were not are kept here; send again.');
  }

  protected async judge(): Promise<void> {
    if (this.judging()) return;
    this.judging.set(true);
    this.problem.set(null);
    try {
      const verdicts = [];
      for (const conditionId of this.conditionsIn())
        if (conditionId)
          verdicts.push(await firstValueFrom(this.client.judge(this.id(), { conditionId, metric: 'rise' })));
      await this.router.navigate(
        verdicts.length === 1 ? ['/verdicts', verdicts[0].id] : ['/studies', this.id()],
      );
    } catch (error) {
      this.judging.set(false);
      this.problem.set(ApiProblem.from(error).words);
    }
  }

  /** j and k walk the logs, x selects, e edits the selection; Ctrl+Z takes an assignment back. */
  protected press(event: KeyboardEvent): void {
    const typing =
      event.target instanceof Element &&
      event.target.closest('input:not([type=checkbox]), textarea, select, [role=slider]') !== null;
    if (typing) return;
    if ((event.ctrlKey || event.metaKey) && event.key === 'z' && this.store.canUndo()) {
      event.preventDefault();
      this.store.undo();
    }
    if (!this.preferences.shortcuts() || event.ctrlKey || event.metaKey || event.altKey) return;
    const logs = this.store.logs();
    const at = logs.findIndex(({ id }) => id === this.store.openId());
    if (event.key === 'j' && at < logs.length - 1) this.store.openId.set(logs[at + 1].id);
    else if (event.key === 'k' && at > 0) this.store.openId.set(logs[at - 1].id);
    else if (event.key.toLowerCase() === 'x' && at >= 0) this.store.toggle(logs[at].id);
    else if (event.key === 'e' && this.store.selected().size > 0) {
      event.preventDefault();
      this.bulk()?.focus();
    }
  }
}
