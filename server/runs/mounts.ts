import { randomUUID } from 'node:crypto';
import type { EntityManager } from 'typeorm';
import { MountEntity } from './run-entity';

/** Id of a cooler's mount of this name in a study; made when it is new. */
export async function mountNamed(
  manager: EntityManager,
  studyId: string,
  coolerId: string,
  name: string,
): Promise<string> {
  const known = await manager.findOneBy(MountEntity, { studyId, coolerId, name });
  if (known) return known.id;
  const id = randomUUID();
  await manager.insert(MountEntity, { id, studyId, coolerId, name });
  return id;
}
