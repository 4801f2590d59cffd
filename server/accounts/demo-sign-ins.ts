import type { Role } from '../../shared/contracts';
import type { Dependencies } from '../dependencies';
import { AccountEntity } from './account-entity';

/** Published on purpose: the invented team is there to be looked at. */
export const DEMO_PASSWORD = 'tenthmark-demo';

export interface DemoSignIn {
  role: Role;
  email: string;
  password: string;
}

/** How to sign in to the invented team; nothing where there is none, or for accounts that changed their password. */
export async function demoSignIns({ config, db }: Dependencies): Promise<DemoSignIn[]> {
  if (!config.demo) return [];
  const accounts = await db.manager.find(AccountEntity, { where: { demo: true }, order: { addedAt: 'ASC' } });
  return accounts
    .filter((account) => account.stoppedAt === null)
    .flatMap(({ roles, email }) =>
      roles.slice(0, 1).map((role) => ({ role, email, password: DEMO_PASSWORD })),
    );
}
