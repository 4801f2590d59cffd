import { Run } from '../../../shared/contracts/studies';
import { Assignment, DroppedLog } from './dropped-log';

/** The place in the study of a run that is stored already. */
export const placeOf = ({ coolerId, conditionId, mount, name }: Run): Assignment => ({
  coolerId,
  conditionId,
  mount,
  run: name,
});

/**
 * What is wrong with a place beside the others of its cooler and condition: another run of the same name in its mount, or mounts
 * told for some runs and not for others. Null when nothing is.
 */
export function clashOf(
  { coolerId, conditionId, mount, run }: Assignment,
  others: readonly Assignment[],
): string | null {
  const beside = others.filter((one) => one.coolerId === coolerId && one.conditionId === conditionId);
  if (beside.some((one) => (one.mount === null) !== (mount === null)))
    return 'mounts are set for some runs of this cooler and not for others';
  if (beside.some((one) => one.mount === mount && one.run.trim() === run.trim()))
    return mount === null
      ? `there is another run ${run} of this cooler`
      : `mount ${mount} has another run ${run}`;
  return null;
}

const isSent = ({ state }: DroppedLog): boolean => state === 'sending' || state === 'done';

/**
 * Marks logs whose bytes are there already, in this drop or in the study. Of two in the drop the one sent first is the original,
 * else the one listed first; so taking the original out of the list makes the copy a run of its own.
 */
export function markCopies(logs: readonly DroppedLog[], stored: readonly Run[]): readonly DroppedLog[] {
  const originals = new Map<string, DroppedLog>();
  for (const log of [...logs.filter(isSent), ...logs])
    if (log.digest !== null && !originals.has(log.digest)) originals.set(log.digest, log);
  return logs.map((log) => {
    if (log.digest === null || isSent(log)) return log;
    const original = originals.get(log.digest);
    const inStudy = stored.find(({ digest }) => digest === log.digest)?.fileName ?? null;
    const sameAs = original && original.id !== log.id ? original.file.name : inStudy;
    return sameAs === log.sameAs ? log : { ...log, sameAs };
  });
}
