import { randomUUID } from 'node:crypto';
import type { EntityManager } from 'typeorm';
import type {
  ChangeThresholdsRequest,
  ThresholdsHistory,
  ThresholdsVersion,
  ThresholdValues,
} from '../../shared/contracts';
import { appendToLedger } from '../audit/ledger-service';
import { isDuplicate } from '../db/duplicate';
import type { Dependencies } from '../dependencies';
import type { Caller } from '../http/caller';
import { HttpProblem } from '../http/problem';
import { ThresholdsEntity } from './thresholds-entity';

/** What a new team begins with. 0.95 and 0.8 are common practice, no source; the gap is for the lead to change. */
export const FIRST_VALUES: ThresholdValues = { confidence: 0.95, power: 0.8, gapThatMatters: 0.5 };

export const valuesOf = (row: ThresholdsEntity): ThresholdValues => ({
  confidence: row.confidence,
  power: row.power,
  gapThatMatters: row.gapThatMattersCelsius,
});

const version = (row: ThresholdsEntity): ThresholdsVersion => ({
  id: row.id,
  number: row.number,
  values: valuesOf(row),
  reason: row.reason,
  madeBy: row.madeBy,
  inForceSince: row.inForceSince.toISOString(),
});

/** The set in force: the newest. */
export async function thresholdsInForce(manager: EntityManager, teamId: string): Promise<ThresholdsEntity> {
  return manager.findOneOrFail(ThresholdsEntity, { where: { teamId }, order: { number: 'DESC' } });
}

export async function thresholdsHistory(manager: EntityManager, teamId: string): Promise<ThresholdsHistory> {
  const rows = await manager.find(ThresholdsEntity, { where: { teamId }, order: { number: 'DESC' } });
  const current = rows[0];
  if (!current) throw new Error(`Team ${teamId} has no thresholds.`);
  return { current: version(current), versions: rows.map(version) };
}

interface NewSet {
  teamId: string;
  number: number;
  values: ThresholdValues;
  reason: string;
  by: string;
  role: string;
  at: Date;
}

/** Stores a set and its ledger entry. */
export async function storeThresholds(manager: EntityManager, set: NewSet): Promise<void> {
  const id = randomUUID();
  await manager.insert(ThresholdsEntity, {
    id,
    teamId: set.teamId,
    number: set.number,
    confidence: set.values.confidence,
    power: set.values.power,
    gapThatMattersCelsius: set.values.gapThatMatters,
    reason: set.reason,
    madeBy: set.by,
    inForceSince: set.at,
  });
  await appendToLedger(manager, {
    teamId: set.teamId,
    at: set.at,
    by: set.by,
    role: set.role,
    action: 'thresholds put in force',
    subject: { kind: 'thresholds', id, name: `Set ${set.number}` },
    content: { number: set.number, values: set.values, reason: set.reason },
  });
}

/** Puts a new set in force. Two leads who looked at the same set can't both replace it. */
export async function changeThresholds(
  { db, clock }: Dependencies,
  caller: Caller,
  request: ChangeThresholdsRequest,
): Promise<ThresholdsHistory> {
  const teamId = caller.team.id;
  const overtaken = (): HttpProblem =>
    new HttpProblem(409, 'thresholds-changed', 'Another set came into force since you opened this page.', {
      detail: 'See the new set, then decide again. Nothing was changed.',
    });
  return db.transaction(async (manager) => {
    const current = await thresholdsInForce(manager, teamId);
    if (current.number !== request.basedOn) throw overtaken();
    const set = { teamId, number: current.number + 1, values: request.values, reason: request.reason };
    try {
      await storeThresholds(manager, { ...set, by: caller.name, role: 'lead', at: clock() });
    } catch (error) {
      throw isDuplicate(error) ? overtaken() : error;
    }
    return thresholdsHistory(manager, teamId);
  });
}
