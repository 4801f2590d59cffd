/** Where a PostgreSQL cluster of ours lives, which programs run it, and as whom. */
import { createHash, randomBytes } from 'node:crypto';
import {
  chmodSync,
  chownSync,
  existsSync,
  mkdirSync,
  readFileSync,
  readdirSync,
  statSync,
  writeFileSync,
} from 'node:fs';
import { dirname, join } from 'node:path';
import { inClone, root } from './places.mjs';
import { Trouble } from './trouble.mjs';

/** The account PostgreSQL runs as when we are root (it refuses to run as root); null: as ourselves. */
export function databaseAccount() {
  if (process.getuid?.() !== 0) return null;
  const line = readFileSync('/etc/passwd', 'utf8')
    .split('\n')
    .find((text) => text.startsWith('postgres:'));
  if (!line)
    throw new Trouble(
      'This machine has no "postgres" account.',
      'Install the postgresql package, then start again.',
    );
  const [, , uid, gid] = line.split(':');
  return { uid: Number(uid), gid: Number(gid) };
}

/** Folders holding initdb and postgres, newest version first. `PG_BIN` names another. */
function programFolders() {
  const debian = '/usr/lib/postgresql';
  const versions = existsSync(debian) ? readdirSync(debian).sort((a, b) => Number(b) - Number(a)) : [];
  const onPath = (process.env.PATH ?? '').split(':').filter(Boolean);
  const all = [process.env.PG_BIN, ...versions.map((version) => join(debian, version, 'bin')), ...onPath];
  return all.filter(
    (folder) => folder && existsSync(join(folder, 'postgres')) && existsSync(join(folder, 'initdb')),
  );
}

/** The newest PostgreSQL's programs, or null when there is none. */
export const findPostgres = () => programFolders()[0] ?? null;

/** The programs for a data folder: a cluster only runs on the major version that made it. */
export function programsFor(data) {
  const folders = programFolders();
  const marker = join(data, 'PG_VERSION');
  if (!existsSync(marker)) return folders[0];
  const version = readFileSync(marker, 'utf8').trim();
  const [newest] = folders;
  const match = folders.find((folder) => folder.includes(`/${version}/`));
  if (match ?? !newest?.startsWith('/usr/lib/postgresql/')) return match ?? newest;
  throw new Trouble(
    `The data in ${data} was made by PostgreSQL ${version}, which is not installed here.`,
    `Install postgresql-${version}, or move the folder away to begin with empty data.`,
  );
}

/** True when any account may pass through every folder on the way to `folder`. */
function openToAll(folder) {
  for (let path = folder; ; path = dirname(path)) {
    if (existsSync(path) && (statSync(path).mode & 0o001) === 0) return false;
    if (path === dirname(path)) return true;
  }
}

/**
 * The folder of a cluster: `.run/<name>` in the clone, or, where the postgres account cannot reach the clone
 * (under /root, say), a folder of that account's named after the clone.
 * @param name `pg` for the working data, `pg-test` for the tests' throw-away cluster
 */
export function clusterHome(name) {
  const inside = inClone('.run', name);
  if (process.getuid?.() !== 0) return inside;
  const hash = createHash('sha256').update(root).digest('hex').slice(0, 12);
  const outside = join('/var/lib/postgresql', `tenthmark-${hash}${name === 'pg' ? '' : `-${name}`}`);
  // Data once begun outside stays in use even if the clone's folders are opened up later.
  return existsSync(outside) || !openToAll(root) ? outside : inside;
}

/** Makes the folder, owned by the database's account and closed to all others. */
export function makeHome(home, account) {
  mkdirSync(home, { recursive: true });
  if (account) chownSync(home, account.uid, account.gid);
  chmodSync(home, 0o700);
}

/** The cluster's password, made at random the first time and kept beside the data, readable by its owner alone. */
export function password(home, account) {
  const file = join(home, 'password');
  if (!existsSync(file)) {
    writeFileSync(file, randomBytes(24).toString('base64url'), { mode: 0o600 });
    if (account) chownSync(file, account.uid, account.gid);
  }
  return readFileSync(file, 'utf8').trim();
}
