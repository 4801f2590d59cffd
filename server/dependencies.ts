import type { DataSource } from 'typeorm';
import type { Config } from './config';
import type { Post } from './mail/mail-service';

/** The database as services use it; inside a transaction, its manager can stand for it. */
export type Database = Pick<DataSource, 'manager' | 'transaction' | 'query'>;

/** How often one may try before waiting. */
export interface Limits {
  readonly windowMilliseconds: number;
  /** Failed sign-ins and wrong invitation tokens from one address. */
  readonly failuresPerAddress: number;
  /** Failed sign-ins for one account, from wherever. */
  readonly failuresPerAccount: number;
}

/** Everything the application needs from outside; tests hand in their own. */
export interface Dependencies {
  readonly config: Config;
  readonly db: Database;
  readonly clock: () => Date;
  readonly post: Post;
  /** bcrypt's cost: doubling the work for each step up. */
  readonly passwordCost: number;
  readonly limits: Limits;
  /** Folder of the built Angular application. */
  readonly webFolder: string;
  readonly report: (line: string, error?: unknown) => void;
}
