import { AccountEntity } from '../accounts/account-entity';
import type { Dependencies } from '../dependencies';
import { seedPeople } from './seed-people';

/**
 * Fills an empty database with the invented team. Does nothing where there is an account already.
 * @returns whether it did
 */
export async function seedDemo(
  dependencies: Dependencies,
  progress: (text: string) => void,
): Promise<boolean> {
  const { db, clock } = dependencies;
  if (await db.manager.exists(AccountEntity)) return false;
  progress('making the demonstration team');
  return db.transaction(async (manager) => {
    // Two servers may start on one empty database.
    await manager.query('lock table teams in share row exclusive mode');
    if (await manager.exists(AccountEntity)) return false;
    await seedPeople(manager, dependencies, clock());
    return true;
  });
}
