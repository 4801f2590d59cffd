/** How long `npm start` takes once everything is installed and built: from the command to a page served. */
import { get } from 'node:http';
import { inClone, root } from '../../server/cli/house/places.mjs';
import { start, stop } from '../../server/cli/house/processes.mjs';

const serves = (address) =>
  new Promise((resolve, reject) => {
    get(address, (response) => resolve(response.resume().statusCode)).once('error', reject);
  });

async function startOnce() {
  const environment = { ...process.env, PORT: '0', DATABASE_URL: '' };
  const child = start(process.execPath, [inClone('server/cli/start.mjs')], {
    cwd: root,
    env: environment,
    stdio: ['ignore', 'pipe', 'inherit'],
    patienceMs: 15_000,
  });
  let said = '';
  const address = await new Promise((resolve, reject) => {
    child.stdout.on('data', (piece) => {
      said += piece;
      const found = /Tenthmark is at (\S+)/.exec(said);
      if (found) resolve(found[1]);
    });
    child.once('exit', () => reject(new Error(`npm start ended early:\n${said}`)));
  });
  const status = await serves(address);
  if (status !== 200) throw new Error(`The first page was answered with ${status}.`);
  return child;
}

export default async function measure() {
  // The first start after a change migrates and may fill the demonstration: not what is measured here.
  await stop(await startOnce());
  const from = performance.now();
  const child = await startOnce();
  const seconds = (performance.now() - from) / 1000;
  await stop(child);
  return [{ what: 'npm start, warm, to the first page', value: seconds, unit: 's', atMost: 3 }];
}
