/**
 * `npx tsx server/cli/write-logs.ts FOLDER`: writes twenty invented logs, two coolers of ten runs each, for trying the
 * intake out. The folder is made when it is not there; files of other names in it are left alone.
 */
import { mkdirSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { sampleLogs } from './demo/sample-logs';

const folder = process.argv[2];
if (!folder) {
  console.error('Name the folder to write to: npx tsx server/cli/write-logs.ts FOLDER');
  process.exitCode = 2;
} else {
  mkdirSync(folder, { recursive: true });
  const logs = sampleLogs();
  for (const log of logs) writeFileSync(join(folder, log.fileName), log.bytes);
  console.log(
    `${logs.length} logs of the coolers ${[...new Set(logs.map((log) => log.cooler))].join(' and ')} written to ${folder}.`,
  );
}
