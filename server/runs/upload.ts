import { createHash, randomUUID } from 'node:crypto';
import { createWriteStream } from 'node:fs';
import { mkdtemp, rm } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { Transform } from 'node:stream';
import { pipeline } from 'node:stream/promises';
import type { Request, RequestHandler } from 'express';
import multer, { type StorageEngine } from 'multer';
import type { ReceivedFile } from './log-store';

const MEGABYTE = 1024 * 1024;
const LIMITS = { files: 200, fileSize: 200 * MEGABYTE, fields: 4, fieldSize: MEGABYTE, parts: 210 };

/** One folder a request, gone when the request is over, however it ends. */
const folders = new WeakMap<Request, Promise<string>>();

function folderOf(request: Request): Promise<string> {
  let folder = folders.get(request);
  if (!folder) {
    folder = mkdtemp(join(tmpdir(), 'tenthmark-'));
    folders.set(request, folder);
  }
  return folder;
}

async function receive(request: Request, file: Express.Multer.File): Promise<Partial<Express.Multer.File>> {
  const path = join(await folderOf(request), randomUUID());
  const hash = createHash('sha256');
  let size = 0;
  const hashing = new Transform({
    transform(chunk: Buffer, _encoding, done) {
      hash.update(chunk);
      size += chunk.length;
      done(null, chunk);
    },
  });
  await pipeline(file.stream, hashing, createWriteStream(path, { mode: 0o600 }));
  // `filename` carries the digest: multer has no field of its own for it.
  return { path, size, filename: hash.digest('hex') };
}

const hashingDisk: StorageEngine = {
  _handleFile(request, file, done) {
    receive(request, file).then(
      (received) => done(null, received),
      (error: unknown) => done(error),
    );
  },
  // The whole folder goes at the end of the request.
  _removeFile(_request, _file, done) {
    done(null);
  },
};

const upload = multer({ storage: hashingDisk, limits: LIMITS, defParamCharset: 'utf8' }).array('files');

/** Takes files to the disk as they come, hashing on the way: an upload never stands in memory. */
export const receiveFiles: RequestHandler = (request, response, next) => {
  response.once('close', () => {
    const folder = folders.get(request);
    if (folder) void folder.then((path) => rm(path, { recursive: true, force: true }));
  });
  upload(request, response, next);
};

/** The files of a request that `receiveFiles` took in, in the order they came. */
export function receivedFiles(request: Request): ReceivedFile[] {
  const files = Array.isArray(request.files) ? request.files : [];
  return files.map((file) => ({
    path: file.path,
    fileName: file.originalname,
    digest: file.filename,
    size: file.size,
  }));
}
