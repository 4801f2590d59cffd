import { createHash, randomUUID } from 'node:crypto';
import { createReadStream } from 'node:fs';
import type { EntityManager } from 'typeorm';
import { LogEntity } from './run-entity';

/** Bytes of a raw file in one row. */
const PART_BYTES = 1024 * 1024;

/** A file received and hashed, waiting on the server's disk. */
export interface ReceivedFile {
  readonly path: string;
  readonly fileName: string;
  readonly digest: string;
  readonly size: number;
}

async function storeParts(manager: EntityManager, logId: string, path: string): Promise<void> {
  let part = 0;
  // A read stream gives chunks of exactly this size, but for the last.
  for await (const bytes of createReadStream(path, { highWaterMark: PART_BYTES })) {
    await manager.query('insert into log_parts (log_id, part, bytes) values ($1, $2, $3)', [
      logId,
      part,
      bytes,
    ]);
    part += 1;
  }
}

/** Stores a raw file unchanged, once for each team however many studies it is brought into.
 *  @returns the stored log's id */
export async function storeLog(
  manager: EntityManager,
  teamId: string,
  file: ReceivedFile,
  at: Date,
): Promise<string> {
  const inserted: { id: string }[] = await manager.query(
    `insert into logs (id, team_id, digest, size, stored_at) values ($1, $2, $3, $4, $5)
     on conflict (team_id, digest) do nothing returning id`,
    [randomUUID(), teamId, file.digest, file.size, at],
  );
  const fresh = inserted[0];
  if (fresh) {
    await storeParts(manager, fresh.id, file.path);
    return fresh.id;
  }
  const known = await manager.findOneByOrFail(LogEntity, { teamId, digest: file.digest });
  return known.id;
}

/** A stored raw file's bytes, 1 MB at a time, in order. No connection is held between parts. */
export async function* readLogBytes(manager: EntityManager, logId: string): AsyncGenerator<Buffer> {
  for (let part = 0; ; part += 1) {
    const rows: { bytes: Buffer }[] = await manager.query(
      'select bytes from log_parts where log_id = $1 and part = $2',
      [logId, part],
    );
    const row = rows[0];
    if (!row) return;
    yield row.bytes;
  }
}

/** SHA-256 of a stored file's bytes as they are now. */
export async function digestOfLog(manager: EntityManager, logId: string): Promise<string> {
  const hash = createHash('sha256');
  for await (const bytes of readLogBytes(manager, logId)) hash.update(bytes);
  return hash.digest('hex');
}
