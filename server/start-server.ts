import { createServer, type Server } from 'node:http';
import type { AddressInfo } from 'node:net';
import { join } from 'node:path';
import type { DataSource } from 'typeorm';
import { prettifyError, ZodError } from 'zod';
import { demoSignIns, type DemoSignIn } from './accounts/demo-sign-ins';
import { createApp } from './app';
import { seedDemo } from './cli/seed';
import type { Config } from './config';
import { createDataSource, migrate } from './db/data-source';
import type { Dependencies, Limits } from './dependencies';
import { carrierFor, Post } from './mail/mail-service';
import { projectRoot } from './project-root';

export const LIMITS: Limits = {
  windowMilliseconds: 15 * 60_000,
  failuresPerAddress: 60,
  failuresPerAccount: 10,
};

export function report(line: string, error?: unknown): void {
  if (error === undefined) console.error(line);
  // A contract that an answer breaks can list thousands of fields; the first tell what is wrong.
  else if (error instanceof ZodError)
    console.error(`${line}:`, prettifyError(error).slice(0, 2000), error.stack?.split('\n    at ').slice(1));
  else console.error(`${line}:`, error);
}

/** Everything the application needs, on a database that is connected. */
export function dependenciesFor(config: Config, db: DataSource): Dependencies {
  const clock = (): Date => new Date();
  return {
    config,
    db,
    clock,
    post: new Post(db, carrierFor(config), clock, report),
    passwordCost: 12,
    limits: LIMITS,
    webFolder: join(projectRoot(), 'dist', 'web'),
    report,
  };
}

export interface RunningServer {
  readonly address: string;
  readonly signIns: readonly DemoSignIn[];
  /** Takes no more requests, finishes those under way (for at most five seconds), closes the database. */
  stop(): Promise<void>;
}

function listen(server: Server, { port, host }: Config): Promise<AddressInfo> {
  return new Promise((resolve, reject) => {
    server.once('error', reject);
    server.listen(port, host, () => resolve(server.address() as AddressInfo));
  });
}

function close(server: Server): Promise<void> {
  return new Promise((resolve) => {
    server.close(() => resolve());
    server.closeIdleConnections();
    setTimeout(() => server.closeAllConnections(), 5000).unref();
  });
}

/**
 * Connects, migrates, fills an empty database with the demonstration if that is on, and listens.
 * @throws Error when the database can't be reached or the port is taken
 */
export async function startServer(config: Config, progress: (text: string) => void): Promise<RunningServer> {
  progress('connecting to the database');
  const db = await createDataSource(config.databaseUrl).initialize();
  try {
    await migrate(db);
    const dependencies = dependenciesFor(config, db);
    if (config.demo) await seedDemo(dependencies, progress);
    const server = createServer(createApp(dependencies).app);
    // Uploads of several large logs over a slow line take longer than Node's five minutes.
    server.requestTimeout = 30 * 60_000;
    const { port } = await listen(server, config);
    dependencies.post.start();
    return {
      address: `http://${config.host.includes(':') ? `[${config.host}]` : config.host}:${port}`,
      signIns: await demoSignIns(dependencies),
      stop: async () => {
        await close(server);
        await dependencies.post.stop();
        await db.destroy();
      },
    };
  } catch (error) {
    await db.destroy();
    throw error;
  }
}
