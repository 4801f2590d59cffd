import { randomUUID } from 'node:crypto';
import { createServer, type Server } from 'node:http';
import { mkdtempSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import supertest from 'supertest';
import type { DataSource } from 'typeorm';
import { AccountEntity, TeamEntity } from '../../../server/accounts/account-entity';
import { hashPassword } from '../../../server/accounts/passwords';
import { createApp } from '../../../server/app';
import { readConfig, type Config } from '../../../server/config';
import { createDataSource, migrate } from '../../../server/db/data-source';
import type { Dependencies, Limits } from '../../../server/dependencies';
import type { Route } from '../../../server/http/route';
import { Post, type Carrier } from '../../../server/mail/mail-service';
import { FIRST_VALUES, storeThresholds } from '../../../server/thresholds/thresholds-service';
import type { Role } from '../../../shared/contracts';
import { createTestDatabase } from '../../support/test-database';

// A machine that builds or tests other things at the same time is slow, not wrong.
jest.setTimeout(60_000);

export const SECRET = 'a secret of the tests, long enough to be one';
export const PASSWORD = 'a long password';
/** bcrypt's least: the tests are about who gets in, not about how slowly. */
const PASSWORD_COST = 4;

export type Agent = ReturnType<typeof supertest.agent>;
type Method = 'get' | 'post' | 'put' | 'patch' | 'delete';

/** A request as Tenthmark's own pages make it. */
export function call(agent: Agent, method: Method, path: string, body?: object): supertest.Test {
  const request = agent[method](path).set('x-tenthmark', '1');
  return body ? request.send(body) : request;
}

export interface TestServer {
  readonly server: Server;
  readonly db: DataSource;
  readonly routes: readonly Route[];
  readonly dependencies: Dependencies;
  /** What the server would have written to its log. */
  readonly reports: string[];
  /** Moves the server's clock on. */
  pass(milliseconds: number): void;
  /** A browser without cookies. */
  stranger(): Agent;
  /** Makes a team with thresholds set 1. */
  addTeam(name: string): Promise<string>;
  addAccount(
    teamId: string,
    roles: Role[],
    email?: string,
  ): Promise<{ id: string; email: string; name: string }>;
  /** A browser signed in to a new account. */
  signedIn(
    teamId: string,
    ...roles: Role[]
  ): Promise<Agent & { account: { id: string; email: string; name: string } }>;
  stop(): Promise<void>;
}

interface Options {
  readonly environment?: Record<string, string>;
  readonly limits?: Partial<Limits>;
  readonly carrier?: Carrier;
}

function testConfig(url: string, environment: Record<string, string> = {}): Config {
  return readConfig({ DATABASE_URL: url, TENTHMARK_SECRET: SECRET, ...environment });
}

async function insertTeam(db: DataSource, name: string): Promise<string> {
  const id = randomUUID();
  const at = new Date();
  await db.transaction(async (manager) => {
    await manager.insert(TeamEntity, { id, name, madeAt: at });
    const first = { teamId: id, number: 1, values: FIRST_VALUES, reason: 'First set.' };
    await storeThresholds(manager, { ...first, by: 'Setting up', role: 'lead', at });
  });
  return id;
}

/** The whole server on a database of its own, listening on a free port. */
export async function startTestServer(options: Options = {}): Promise<TestServer> {
  const database = await createTestDatabase();
  const db = await createDataSource(database.url, 5).initialize();
  await migrate(db);
  const reports: string[] = [];
  const report = (line: string, error?: unknown): void => {
    reports.push(`${line} ${error instanceof Error ? (error.stack ?? error.message) : ''}`);
  };
  let ahead = 0;
  const clock = (): Date => new Date(Date.now() + ahead);
  const dependencies: Dependencies = {
    config: testConfig(database.url, options.environment),
    db,
    clock,
    post: new Post(db, options.carrier ?? null, clock, report),
    passwordCost: PASSWORD_COST,
    limits: {
      windowMilliseconds: 60_000,
      failuresPerAddress: 1000,
      failuresPerAccount: 1000,
      ...options.limits,
    },
    webFolder: mkdtempSync(join(tmpdir(), 'tenthmark-web-')),
    report,
  };
  const { app, routes } = createApp(dependencies);
  const server = createServer(app);
  await new Promise<void>((resolve) => server.listen(0, '127.0.0.1', resolve));
  const passwordHash = await hashPassword(PASSWORD, PASSWORD_COST, 'password');
  let people = 0;

  const addAccount: TestServer['addAccount'] = async (teamId, roles, email) => {
    people += 1;
    const account = {
      id: randomUUID(),
      email: email ?? `person${people}@lab.example`,
      name: `Person ${people}`,
    };
    await db.manager.insert(AccountEntity, {
      ...account,
      teamId,
      roles,
      passwordHash,
      demo: false,
      addedAt: clock(),
      stoppedAt: null,
      lastSignInAt: null,
    });
    return account;
  };

  return {
    server,
    db,
    routes,
    dependencies,
    reports,
    pass: (milliseconds) => {
      ahead += milliseconds;
    },
    stranger: () => supertest.agent(server),
    addTeam: (name) => insertTeam(db, name),
    addAccount,
    signedIn: async (teamId, ...roles) => {
      const account = await addAccount(teamId, roles);
      const agent = supertest.agent(server);
      await call(agent, 'post', '/api/session', { email: account.email, password: PASSWORD }).expect(200);
      return Object.assign(agent, { account });
    },
    stop: async () => {
      await dependencies.post.stop();
      server.closeAllConnections();
      await new Promise((resolve) => server.close(resolve));
      await db.destroy();
      await database.drop();
    },
  };
}
