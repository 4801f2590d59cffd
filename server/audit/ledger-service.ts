import { randomUUID } from 'node:crypto';
import type { EntityManager } from 'typeorm';
import type { LedgerCheck, LedgerEntry } from '../../shared/contracts';
import { digestOf, storable } from '../db/storable';
import { LedgerEntryEntity } from './ledger-entity';

/** Something that happened and is to be kept: who did what to what, in which role. */
export interface Happening {
  readonly teamId: string;
  readonly at: Date;
  readonly by: string;
  readonly role: string;
  readonly action: string;
  readonly subject: { readonly kind: string; readonly id: string; readonly name: string };
  readonly content?: Record<string, unknown>;
}

export function ledgerEntry(row: LedgerEntryEntity): LedgerEntry {
  return {
    id: row.id,
    number: row.number,
    at: row.at.toISOString(),
    by: row.by,
    role: row.role,
    action: row.action,
    subject: { kind: row.subjectKind, id: row.subjectId, name: row.subjectName },
    content: row.content,
    previous: row.previous,
    digest: row.digest,
  };
}

/** SHA-256 over the canonical JSON of an entry as it is shown, without the digest itself. */
export function entryDigest(entry: Omit<LedgerEntry, 'digest'>): string {
  return digestOf({
    id: entry.id,
    number: entry.number,
    at: entry.at,
    by: entry.by,
    role: entry.role,
    action: entry.action,
    subject: entry.subject,
    content: entry.content,
    previous: entry.previous,
  });
}

/**
 * Adds an entry to the end of the team's chain, in the transaction of the act it records: the act and its record
 * are stored together or not at all.
 */
export async function appendToLedger(manager: EntityManager, happening: Happening): Promise<void> {
  const { teamId } = happening;
  // One writer a team at a time, until the transaction ends: two entries must not follow the same one.
  await manager.query(`select pg_advisory_xact_lock(hashtextextended('ledger ' || $1::text, 0))`, [teamId]);
  const last = await manager.findOne(LedgerEntryEntity, { where: { teamId }, order: { number: 'DESC' } });
  const entry = storable({
    id: randomUUID(),
    number: (last?.number ?? 0) + 1,
    at: happening.at.toISOString(),
    by: happening.by,
    role: happening.role,
    action: happening.action,
    subject: happening.subject,
    content: happening.content ?? {},
    previous: last?.digest ?? null,
  });
  await manager.insert(LedgerEntryEntity, {
    id: entry.id,
    teamId,
    number: entry.number,
    at: happening.at,
    by: entry.by,
    role: entry.role,
    action: entry.action,
    subjectKind: entry.subject.kind,
    subjectId: entry.subject.id,
    subjectName: entry.subject.name,
    content: entry.content as object,
    previous: entry.previous,
    digest: entryDigest(entry),
  });
}

/** Newest first. */
export async function ledgerPage(
  manager: EntityManager,
  teamId: string,
  { page, pageSize }: { page: number; pageSize: number },
): Promise<{ items: LedgerEntry[]; page: number; pageSize: number; total: number }> {
  const [rows, total] = await manager.findAndCount(LedgerEntryEntity, {
    where: { teamId },
    order: { number: 'DESC' },
    skip: (page - 1) * pageSize,
    take: pageSize,
  });
  return { items: rows.map(ledgerEntry), page, pageSize, total };
}

const CHECKED_AT_ONCE = 1000;

/** Goes along the whole chain: every number in turn, every entry's digest, every link to the one before. */
export async function checkLedger(manager: EntityManager, teamId: string, at: Date): Promise<LedgerCheck> {
  let entries = 0;
  let brokenAt: number | null = null;
  let previous: string | null = null;
  for (;;) {
    const rows: LedgerEntryEntity[] = await manager
      .createQueryBuilder(LedgerEntryEntity, 'entry')
      .where('entry.team_id = :teamId and entry.number > :entries', { teamId, entries: entries })
      .orderBy('entry.number')
      .take(CHECKED_AT_ONCE)
      .getMany();
    for (const row of rows) {
      const entry = ledgerEntry(row);
      const holds =
        entry.number === entries + 1 && entry.previous === previous && entry.digest === entryDigest(entry);
      if (!holds) brokenAt ??= entries + 1;
      previous = entry.digest;
      entries = entry.number;
    }
    if (rows.length < CHECKED_AT_ONCE) break;
  }
  return { entries, whole: brokenAt === null, brokenAt, latestDigest: previous, checkedAt: at.toISOString() };
}
