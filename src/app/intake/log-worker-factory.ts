/** Alone in its file: Jest cannot run `import.meta` and puts a stand-in here. */
export const makeLogWorker = (): Worker =>
  new Worker(new URL('./log.worker', import.meta.url), { type: 'module' });
