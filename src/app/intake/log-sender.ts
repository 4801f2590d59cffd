import { inject, Injectable } from '@angular/core';
import { concatMap, from, lastValueFrom, map, tap } from 'rxjs';
import { IntakeOutcome, intakeResultSchema, RunAssignment } from '../../../shared/contracts/studies';
import { Api } from '../core/api';
import { ApiProblem } from '../core/api-problem';
import { DroppedLog } from './dropped-log';
import { IntakeStore } from './intake-store';

/** Files of one request: small enough that a lost connection costs little. */
const BATCH = 5;

/** Sends logs to the server a few at a time, telling what became of each. */
@Injectable()
export class LogSender {
  private readonly api = inject(Api);
  private readonly store = inject(IntakeStore);

  /** @returns whether every batch got an answer; the logs of one that did not stay as they were */
  async send(studyId: string, logs: readonly DroppedLog[]): Promise<boolean> {
    const batches = Array.from({ length: Math.ceil(logs.length / BATCH) }, (_, index) =>
      logs.slice(index * BATCH, (index + 1) * BATCH),
    );
    // Before anything is sent: a log's place in the order must not move while others go out.
    const assignments = new Map(logs.map((log) => [log.id, this.assignmentOf(log)]));
    const ids = new Set(logs.map(({ id }) => id));
    this.store.sending(ids);
    try {
      await lastValueFrom(
        from(batches).pipe(
          concatMap((batch) =>
            this.api.post(`/studies/${studyId}/runs`, formOf(batch, assignments), intakeResultSchema).pipe(
              map(({ outcomes }) => outcomes),
              tap((outcomes) => this.note(batch, outcomes, ids)),
            ),
          ),
        ),
        { defaultValue: [] },
      );
      return true;
    } catch (error) {
      this.store.notSent(ids, ApiProblem.from(error).words);
      return false;
    }
  }

  private note(batch: readonly DroppedLog[], outcomes: readonly IntakeOutcome[], open: Set<number>): void {
    batch.forEach((log, index) => {
      const outcome = outcomes[index] ?? outcomes.find(({ fileName }) => fileName === log.file.name);
      if (!outcome) return;
      open.delete(log.id);
      this.store.sent(log.id, outcome);
    });
  }

  private assignmentOf(log: DroppedLog): RunAssignment {
    const { coolerId, conditionId, mount, run } = log.assignment;
    return {
      fileName: log.file.name,
      digest: log.digest ?? '',
      coolerId: coolerId ?? '',
      conditionId: conditionId ?? '',
      mount,
      run: run.trim(),
      order: this.store.orderOf(log),
      columnMap: log.choices.columnMap,
      fixedAmbient: log.choices.fixedAmbient,
      window: log.choices.window,
    };
  }
}

/** The assignments first, so that the server knows each file before its bytes arrive. */
function formOf(batch: readonly DroppedLog[], assignments: ReadonlyMap<number, RunAssignment>): FormData {
  const form = new FormData();
  form.append('assignments', JSON.stringify(batch.map(({ id }) => assignments.get(id))));
  for (const { file } of batch) form.append('files', file, file.name);
  return form;
}
