// From bytes to a run: read a log, find its columns, reduce it to one honest number with its uncertainty.
export { startReading } from './read-log';
export type { Dialect, Log, LogReading, ReadLog, ReadingOptions } from './log';
export { reduceRun } from './reduce-run';
export type { ReducedRun, RunChoices } from './reduce-run';

// What a file's name says.
export { guessFromName, matchCooler } from './guess-from-name';
