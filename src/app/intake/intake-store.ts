import { computed, inject, Injectable, signal } from '@angular/core';
import { takeUntilDestroyed } from '@angular/core/rxjs-interop';
import { ColumnMap } from '../../../shared/contracts/run-summary';
import { Condition, IntakeOutcome, Run, Study, StudyCooler } from '../../../shared/contracts/studies';
import { Assignment, DroppedLog, isRun, needsALook, whatIsMissing } from './dropped-log';
import { conditionByPower, firstGuess } from './first-guess';
import { LogChoices, LogReply } from './log-messages';
import { LogReaders } from './log-readers';

const NO_CHOICES: LogChoices = { columnMap: null, fixedAmbient: null, window: null, nominalWatts: null };

/** How the order of testing is known. */
export type OrderOfTesting = 'by their clocks' | 'as listed' | 'not known';

const startOf = (log: DroppedLog): string => log.readout?.summary?.startedAt ?? '';

/** Steps of assigning that can be taken back. */
const MOST_UNDO = 50;

/** The logs of one drop: what was read, where each belongs, and whether they can be sent. */
@Injectable()
export class IntakeStore {
  private readonly readers = inject(LogReaders);
  private nextId = 1;
  private study: Study | null = null;
  private stored: readonly Run[] = [];
  private readonly undoStack = signal<readonly ReadonlyMap<number, Assignment>[]>([]);

  readonly logs = signal<readonly DroppedLog[]>([]);
  readonly selected = signal<ReadonlySet<number>>(new Set());
  readonly openId = signal<number | null>(null);

  readonly open = computed(() => this.logs().find(({ id }) => id === this.openId()) ?? null);
  readonly canUndo = computed(() => this.undoStack().length > 0);
  readonly counts = computed(() => {
    const logs = this.logs();
    const of = (...states: DroppedLog['state'][]) =>
      logs.filter(({ state }) => states.includes(state)).length;
    return {
      all: logs.length,
      waiting: of('waiting'),
      reading: of('reading'),
      read: of('read', 'failed', 'sending', 'done'),
      look: logs.filter(needsALook).length,
    };
  });
  /** Runs that would be sent now, and what holds the others back, by log. */
  readonly toSend = computed(() => this.logs().filter(isRun));
  readonly missing = computed(() => {
    const problems = new Map<number, string>();
    for (const log of this.toSend()) {
      const missing = whatIsMissing(log) ?? this.clash(log);
      if (missing) problems.set(log.id, missing);
    }
    return problems;
  });
  readonly ready = computed(() => this.toSend().filter(({ id }) => !this.missing().has(id)));

  private readonly ordered = computed(() =>
    this.logs().filter((log) => isRun(log) || log.outcome?.outcome === 'stored'),
  );
  /** Whether every log tells when it was started. */
  readonly haveClocks = computed(
    () => this.ordered().length > 0 && this.ordered().every((log) => startOf(log) !== ''),
  );
  readonly chosenOrder = signal<OrderOfTesting | null>(null);
  readonly order = computed<OrderOfTesting>(() => {
    const chosen = this.chosenOrder() ?? 'by their clocks';
    return chosen === 'by their clocks' && !this.haveClocks() ? 'not known' : chosen;
  });

  constructor() {
    this.readers.replies.pipe(takeUntilDestroyed()).subscribe((reply) => this.hear(reply));
  }

  /** Tells the store which study the logs are for and which runs it has. */
  begin(study: Study, stored: readonly Run[]): void {
    this.study = study;
    this.stored = stored;
  }

  add(files: readonly File[]): void {
    const added = files.map((file): DroppedLog => {
      const assignment = this.study
        ? firstGuess(file.name, this.study.coolers, this.study.conditions)
        : { coolerId: null, conditionId: null, mount: null, run: '' };
      return {
        id: this.nextId++,
        file,
        state: 'waiting',
        progress: 0,
        digest: null,
        readout: null,
        choices: { ...NO_CHOICES, nominalWatts: this.wattsOf(assignment.conditionId) },
        assignment,
        sameAs: null,
        outcome: null,
        trouble: null,
      };
    });
    this.logs.update((logs) => [...logs, ...added]);
    for (const { id, file, choices } of added) this.readers.read(id, file, choices);
    if (this.openId() === null && added.length > 0) this.openId.set(added[0].id);
  }

  /** Takes logs out of the drop; nothing was sent of them. */
  remove(ids: ReadonlySet<number>): void {
    for (const id of ids) this.readers.forget(id);
    this.logs.update((logs) => logs.filter(({ id }) => !ids.has(id)));
    this.selected.set(new Set());
    if (!this.open()) this.openId.set(this.logs()[0]?.id ?? null);
  }

  /** Assigns several logs at once; fields left out stay. Can be taken back. */
  assign(ids: ReadonlySet<number>, change: Partial<Assignment> & { readonly runFromName?: boolean }): void {
    this.remember();
    const { runFromName, ...fields } = change;
    for (const id of ids)
      this.patch(id, (log) => {
        const guess =
          runFromName && this.study
            ? firstGuess(log.file.name, this.study.coolers, this.study.conditions)
            : null;
        const assignment = { ...log.assignment, ...fields, ...(guess?.run ? { run: guess.run } : {}) };
        return {
          ...log,
          assignment,
          choices: { ...log.choices, nominalWatts: this.wattsOf(assignment.conditionId) },
        };
      });
  }

  undo(): void {
    const before = this.undoStack().at(-1);
    if (!before) return;
    this.undoStack.update((stack) => stack.slice(0, -1));
    this.logs.update((logs) =>
      logs.map((log) => ({ ...log, assignment: before.get(log.id) ?? log.assignment })),
    );
  }

  /** Reads the log again with other columns; `alike` does the same for every log with the same header. */
  setColumns(id: number, columnMap: ColumnMap, alike: boolean): void {
    const header = this.headerOf(id);
    for (const log of this.logs()) {
      if (log.id !== id && !(alike && header !== '' && this.headerOf(log.id) === header)) continue;
      const choices = { ...log.choices, columnMap };
      this.patch(log.id, (before) => ({ ...before, choices, state: 'reading', progress: 0 }));
      this.readers.read(log.id, log.file, choices);
    }
  }

  setFixedAmbient(id: number, fixedAmbient: number | null): void {
    this.reduceWith(id, (choices) => ({ ...choices, fixedAmbient }));
  }

  setWindow(id: number, window: LogChoices['window']): void {
    this.reduceWith(id, (choices) => ({ ...choices, window }));
  }

  /** Words of the reason need no new reduction. */
  setWindowReason(id: number, reason: string): void {
    this.patch(id, (log) =>
      log.choices.window
        ? { ...log, choices: { ...log.choices, window: { ...log.choices.window, reason } } }
        : log,
    );
  }

  sending(ids: ReadonlySet<number>): void {
    for (const id of ids) this.patch(id, (log) => ({ ...log, state: 'sending', trouble: null }));
  }

  sent(id: number, outcome: IntakeOutcome): void {
    this.patch(id, (log) => ({ ...log, state: outcome.outcome === 'refused' ? 'failed' : 'done', outcome }));
  }

  notSent(ids: ReadonlySet<number>, trouble: string): void {
    for (const id of ids) this.patch(id, (log) => ({ ...log, state: 'read', trouble }));
  }

  toggle(id: number): void {
    this.selected.update((selected) => {
      const next = new Set(selected);
      if (!next.delete(id)) next.add(id);
      return next;
    });
  }

  /**
   * The place of a log in the order of testing, after the stored runs; null when it is not known. An order that nobody vouches
   * for would make the check for drift say things that are not so.
   */
  orderOf(log: DroppedLog): number | null {
    const how = this.order();
    if (how === 'not known') return null;
    const runs = [...this.ordered()].sort(
      how === 'by their clocks'
        ? (a, b) => startOf(a).localeCompare(startOf(b)) || a.id - b.id
        : (a, b) => a.id - b.id,
    );
    const last = Math.max(0, ...this.stored.map(({ order }) => order ?? 0));
    return last + runs.findIndex(({ id }) => id === log.id) + 1;
  }

  coolerName(id: string | null): string {
    return this.study?.coolers.find((cooler: StudyCooler) => cooler.id === id)?.name ?? 'not set';
  }

  private hear(reply: LogReply): void {
    switch (reply.kind) {
      case 'progress':
        this.patch(reply.id, (log) => ({ ...log, state: 'reading', progress: reply.share }));
        break;
      case 'read':
        this.patch(reply.id, (log) =>
          this.withGuesses({
            ...log,
            state: 'read',
            progress: 1,
            digest: reply.digest,
            readout: reply.readout,
            sameAs: this.sameAs(log.id, reply.digest),
          }),
        );
        break;
      case 'reduced':
        this.patch(reply.id, (log) => ({ ...log, readout: reply.readout }));
        break;
      case 'failed':
        this.patch(reply.id, (log) => ({ ...log, state: 'failed', trouble: reply.text }));
    }
  }

  /** What the name did not tell and the log does: the condition by its power, the run by counting on. */
  private withGuesses(log: DroppedLog): DroppedLog {
    const { assignment, readout } = log;
    const conditionId =
      assignment.conditionId ??
      conditionByPower(readout?.summary?.watts?.mean ?? null, this.study?.conditions ?? []);
    const run = assignment.run || String(this.logs().findIndex(({ id }) => id === log.id) + 1);
    const choices = { ...log.choices, nominalWatts: this.wattsOf(conditionId) };
    return { ...log, assignment: { ...assignment, conditionId, run }, choices };
  }

  private sameAs(id: number, digest: string): string | null {
    const earlier = this.logs().find((log) => log.id !== id && log.digest === digest);
    return earlier?.file.name ?? this.stored.find((run) => run.digest === digest)?.fileName ?? null;
  }

  /** Another run of the same name at the same place; or mounts set for some logs of a cooler and not for others. */
  private clash(log: DroppedLog): string | null {
    const { coolerId, conditionId, mount, run } = log.assignment;
    const beside = [
      ...this.toSend()
        .filter(({ id }) => id !== log.id)
        .map(({ assignment }) => assignment),
      ...this.stored.map((one) => ({
        coolerId: one.coolerId,
        conditionId: one.conditionId,
        mount: one.mount,
        run: one.name,
      })),
    ].filter((one) => one.coolerId === coolerId && one.conditionId === conditionId);
    if (beside.some((one) => (one.mount === null) !== (mount === null)))
      return 'mounts are set for some runs of this cooler and not for others';
    if (beside.some((one) => one.mount === mount && one.run.trim() === run.trim()))
      return mount === null
        ? `there is another run ${run} of this cooler`
        : `mount ${mount} has another run ${run}`;
    return null;
  }

  private reduceWith(id: number, change: (choices: LogChoices) => LogChoices): void {
    const log = this.logs().find((one) => one.id === id);
    if (!log) return;
    const choices = change(log.choices);
    this.patch(id, (before) => ({ ...before, choices }));
    this.readers.reduce(id, choices);
  }

  private wattsOf(conditionId: string | null): number | null {
    return (
      this.study?.conditions.find((condition: Condition) => condition.id === conditionId)?.nominalWatts ??
      null
    );
  }

  private headerOf(id: number): string {
    const columns = this.logs().find((log) => log.id === id)?.readout?.columns ?? [];
    return columns.map(({ header }) => header).join('\u0000');
  }

  private remember(): void {
    const now = new Map(this.logs().map(({ id, assignment }) => [id, assignment]));
    this.undoStack.update((stack) => [...stack, now].slice(-MOST_UNDO));
  }

  private patch(id: number, change: (log: DroppedLog) => DroppedLog): void {
    this.logs.update((logs) => logs.map((log) => (log.id === id ? change(log) : log)));
  }
}
