import { computed, inject, Injectable, signal } from '@angular/core';
import { takeUntilDestroyed } from '@angular/core/rxjs-interop';
import { ColumnMap } from '../../../shared/contracts/run-summary';
import { Condition, IntakeOutcome, Run, Study, StudyCooler } from '../../../shared/contracts/studies';
import { clashOf, markCopies, placeOf } from './clash';
import { Assignment, DroppedLog, isRun, needsALook, whatIsMissing } from './dropped-log';
import { conditionByPower, firstGuess } from './first-guess';
import { LogChoices, LogReply } from './log-messages';
import { LogReaders } from './log-readers';

const NO_CHOICES: LogChoices = { columnMap: null, fixedAmbient: null, window: null, nominalWatts: null };

/** How the order of testing is known. */
export type OrderOfTesting = 'by their clocks' | 'as listed' | 'not known';

const startOf = (log: DroppedLog): string => log.readout?.summary?.startedAt ?? '';

/** Steps of assigning and leaving out that can be taken back. */
const MOST_UNDO = 50;

/** The largest log the server takes, bytes. */
const LARGEST = 200 * 1024 * 1024;

/** Whether its place is a matter of record by now. */
const isFixed = ({ state }: DroppedLog): boolean => state === 'sending' || state === 'done';

/** The logs of one drop: what was read, where each belongs, and whether they can be sent. */
@Injectable()
export class IntakeStore {
  private readonly readers = inject(LogReaders);
  private nextId = 1;
  private study: Study | null = null;
  private stored: readonly Run[] = [];
  private readonly undoStack = signal<readonly (readonly DroppedLog[])[]>([]);

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
      const missing = whatIsMissing(log) ?? clashOf(log.assignment, this.othersThan(log.id));
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
        state: file.size > LARGEST ? 'failed' : 'waiting',
        progress: 0,
        digest: null,
        readout: null,
        choices: { ...NO_CHOICES, nominalWatts: this.wattsOf(assignment.conditionId) },
        assignment,
        sameAs: null,
        outcome: null,
        trouble: file.size > LARGEST ? 'Over 200 MB. Split the log, one run a file.' : null,
      };
    });
    this.logs.update((logs) => [...logs, ...added]);
    for (const { id, file, choices, state } of added)
      if (state === 'waiting') this.readers.read(id, file, choices);
    if (this.openId() === null && added.length > 0) this.openId.set(added[0].id);
  }

  /** Takes logs out of the drop, but for those sent. Can be taken back. */
  remove(ids: ReadonlySet<number>): void {
    const goes = (log: DroppedLog): boolean => ids.has(log.id) && !isFixed(log);
    this.remember();
    for (const { id } of this.logs().filter(goes)) this.readers.forget(id);
    this.logs.update((logs) =>
      markCopies(
        logs.filter((log) => !goes(log)),
        this.stored,
      ),
    );
    this.selected.set(new Set());
    if (!this.open()) this.openId.set(this.logs()[0]?.id ?? null);
  }

  /** Assigns several logs at once; fields left out stay. Can be taken back. */
  assign(ids: ReadonlySet<number>, change: Partial<Assignment> & { readonly runFromName?: boolean }): void {
    this.remember();
    const { runFromName, ...fields } = change;
    for (const id of ids) {
      this.patch(id, (log) => {
        if (isFixed(log)) return log;
        const guess =
          runFromName && this.study
            ? firstGuess(log.file.name, this.study.coolers, this.study.conditions)
            : null;
        const assignment = { ...log.assignment, ...fields, ...(guess?.run ? { run: guess.run } : {}) };
        return { ...log, assignment };
      });
      this.setWatts(id);
    }
  }

  undo(): void {
    const before = this.undoStack().at(-1);
    if (!before) return;
    this.undoStack.update((stack) => stack.slice(0, -1));
    const now = new Map(this.logs().map((log) => [log.id, log]));
    const places = new Map(before.map(({ id, assignment }) => [id, assignment]));
    const placed = (log: DroppedLog): DroppedLog =>
      isFixed(log) ? log : { ...log, assignment: places.get(log.id) ?? log.assignment };
    const back = before.filter(({ id }) => !now.has(id));
    const added = this.logs().filter(({ id }) => !places.has(id));
    const logs = [...before.map((log) => placed(now.get(log.id) ?? log)), ...added];
    this.logs.set(markCopies(logs, this.stored));
    // Their readers have forgotten them.
    for (const { id, file, choices, state } of back)
      if (state !== 'failed') this.readers.read(id, file, choices);
    for (const { id } of logs) this.setWatts(id);
    if (!this.open()) this.openId.set(logs[0]?.id ?? null);
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
          }),
        );
        this.logs.update((logs) => markCopies(logs, this.stored));
        this.setWatts(reply.id);
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
    return { ...log, assignment: { ...assignment, conditionId, run } };
  }

  /** Places taken by the study's runs, those stored from here, and the other runs of the drop. */
  private othersThan(id: number): Assignment[] {
    const others = this.ordered().filter((log) => log.id !== id);
    return [...others.map(({ assignment }) => assignment), ...this.stored.map(placeOf)];
  }

  /** The findings compare logged power with the condition's: another condition, another reduction. */
  private setWatts(id: number): void {
    const log = this.logs().find((one) => one.id === id);
    if (!log || isFixed(log)) return;
    const nominalWatts = this.wattsOf(log.assignment.conditionId);
    if (nominalWatts !== log.choices.nominalWatts)
      this.reduceWith(id, (choices) => ({ ...choices, nominalWatts }));
  }

  private reduceWith(id: number, change: (choices: LogChoices) => LogChoices): void {
    const log = this.logs().find((one) => one.id === id);
    if (!log) return;
    const choices = change(log.choices);
    this.patch(id, (before) => ({ ...before, choices }));
    this.readers.reduce(id, log.file, choices);
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
    const now = this.logs();
    this.undoStack.update((stack) => [...stack, now].slice(-MOST_UNDO));
  }

  private patch(id: number, change: (log: DroppedLog) => DroppedLog): void {
    this.logs.update((logs) => logs.map((log) => (log.id === id ? change(log) : log)));
  }
}
