import { ConfigError, readConfig } from './config';
import { startServer } from './start-server';

/** One line for the person who started us, without a stack: the cause is outside the program. */
function inOneLine(error: unknown): string | null {
  if (error instanceof ConfigError) return error.message;
  const { code, message, errors } = (error ?? {}) as {
    code?: unknown;
    message?: unknown;
    errors?: unknown[];
  };
  if (code === 'EADDRINUSE') return `The port is taken by another program: ${String(message)}.`;
  const outside = [
    'ECONNREFUSED',
    'ENOTFOUND',
    'ETIMEDOUT',
    '28P01',
    '28000',
    '3D000',
    'EACCES',
    'EADDRNOTAVAIL',
  ];
  if (typeof code !== 'string' || !outside.includes(code)) return null;
  const why = errors?.length ? errors.map((one) => (one as Error).message).join(', ') : String(message);
  return `The server can’t start: ${why}.`;
}

async function main(): Promise<void> {
  const config = readConfig(process.env);
  const server = await startServer(config, (text) => process.send?.({ type: 'progress', text }));
  let stopping = false;
  const stop = (): void => {
    if (stopping) return;
    stopping = true;
    server.stop().then(
      () => process.exit(0),
      (error: unknown) => {
        console.error('Stopping failed:', error);
        process.exit(1);
      },
    );
  };
  process.on('SIGTERM', stop);
  process.on('SIGINT', stop);
  process.on('disconnect', stop);
  // The channel to whoever started us must not by itself keep us alive.
  process.channel?.unref();
  const { address, signIns } = server;
  if (process.send) process.send({ type: 'ready', address, signIns });
  else console.log(`Tenthmark is at ${address}`);
}

main().catch((error: unknown) => {
  console.error(inOneLine(error) ?? error);
  process.exit(1);
});
