import { IntakeOutcome } from '../../../shared/contracts/studies';
import { LogProblem } from '../../../shared/contracts/run-summary';
import { LogChoices, LogReadout } from './log-messages';

/** To which place in the study a log belongs. */
export interface Assignment {
  readonly coolerId: string | null;
  readonly conditionId: string | null;
  /** null: mounts not recorded. */
  readonly mount: string | null;
  readonly run: string;
}

/** One file of a drop, from waiting to stored. */
export interface DroppedLog {
  readonly id: number;
  readonly file: File;
  readonly state: 'waiting' | 'reading' | 'read' | 'failed' | 'sending' | 'done';
  /** Share read, 0 to 1. */
  readonly progress: number;
  readonly digest: string | null;
  readonly readout: LogReadout | null;
  readonly choices: LogChoices;
  readonly assignment: Assignment;
  /** Name of the file with the same bytes, in this drop or already in the study. */
  readonly sameAs: string | null;
  readonly outcome: IntakeOutcome | null;
  /** What is wrong with reading or sending it, beyond the log's own problems. */
  readonly trouble: string | null;
}

/** Problems that keep the log out: there is no run without them settled. */
export const problemsOf = (log: DroppedLog): readonly LogProblem[] =>
  log.outcome?.outcome === 'refused' ? log.outcome.problems : (log.readout?.problems ?? []);

/** Whether something about this log needs a person's look. */
export const needsALook = (log: DroppedLog): boolean =>
  log.trouble !== null ||
  problemsOf(log).length > 0 ||
  (log.state === 'read' && log.readout?.summary === null) ||
  (log.readout?.summary?.findings.some(({ level }) => level !== 'note') ?? false);

/** Whether the log is a run that can be sent once it is assigned. */
export const isRun = (log: DroppedLog): boolean =>
  (log.state === 'read' || log.state === 'sending') &&
  (log.readout?.summary ?? null) !== null &&
  log.sameAs === null;

/** Why this log cannot be sent as it stands; null when it can. */
export function whatIsMissing({ assignment, choices }: DroppedLog): string | null {
  if (assignment.coolerId === null) return 'no cooler set';
  if (assignment.conditionId === null) return 'no condition set';
  if (assignment.run.trim() === '') return 'no run set';
  if (choices.window && choices.window.reason.trim().length < 3) return 'the moved window needs a reason';
  return null;
}
