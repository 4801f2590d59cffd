import { startReading } from '../../../shared/reduction';
import { Random } from './random';
import { WrittenLog, writtenLog } from './written-log';

/** Reads bytes in chunks of chance sizes. */
function readInChunks(bytes: Uint8Array, seed: number) {
  const r = new Random(seed);
  const reading = startReading('log.csv');
  const largest = r.pick([3, 100, 5000, 70000, 10_000_000]);
  for (let at = 0; at < bytes.length;) {
    const size = r.whole(1, largest);
    reading.write(bytes.subarray(at, at + size));
    at += size;
  }
  return reading.end();
}

/** First place where two columns differ, or null. Numbers must be the same to the last bit, and missing in the same rows. */
function difference(
  what: string,
  got: ArrayLike<number> | undefined,
  wanted: readonly number[],
): string | null {
  if (!got || got.length !== wanted.length)
    return `${what}: ${got?.length ?? 'no'} readings for ${wanted.length}`;
  const at = wanted.findIndex((value, i) => !Object.is(value, got[i]));
  return at === -1 ? null : `${what} at ${at}: ${got[at]} for ${wanted[at]}`;
}

/** What a reader made of a written log that is not so, in words. */
function mistakes(written: WrittenLog, seed: number): string[] {
  const { log, problems } = readInChunks(written.bytes, seed);
  const codes = problems.map(({ code }) => code).join();
  if (!log || codes !== written.problems.join()) return [`problems: ${codes || 'none'}`];
  const roles = Object.entries(written.positions).filter(
    ([role, position]) => log.columnMap[role as 'time'] !== position,
  );
  if (roles.length > 0)
    return roles.map(
      ([role, position]) => `${role}: column ${log.columnMap[role as 'time']} for ${position}`,
    );
  const { heatSource, ambient, watts, fanSpeed } = written.positions;
  const late = log.seconds.findIndex((t, i) => !(Math.abs(t - written.seconds[i]) < 1e-3));
  return [
    difference('row', log.rows, written.rows),
    late === -1 ? null : `time at ${late}: ${log.seconds[late]} for ${written.seconds[late]}`,
    difference('heat source', log.kept.get(heatSource), written.heat),
    difference('ambient', log.kept.get(ambient), written.ambient),
    watts === null ? null : difference('watts', log.kept.get(watts), written.watts ?? []),
    fanSpeed === null ? null : difference('fan speed', log.kept.get(fanSpeed), written.fan ?? []),
    log.startedAt === written.startedAt ? null : `start: ${log.startedAt} for ${written.startedAt}`,
  ].filter((text) => text !== null);
}

const COMBINATIONS = 500;

describe('logs of any dialect', () => {
  it(`give back the numbers they were written with, over ${COMBINATIONS} combinations at random`, () => {
    for (let seed = 1; seed <= COMBINATIONS; seed += 1) {
      const written = writtenLog(seed);
      expect({ ...written.variation, mistakes: mistakes(written, seed) }).toEqual({
        ...written.variation,
        mistakes: [],
      });
    }
  });

  it('would notice a cell read wrongly', () => {
    const written = writtenLog(3);
    const heat = written.heat.map((value, i) => (i === 70 ? value + 1e-9 : value));
    expect(mistakes({ ...written, heat }, 3)).toHaveLength(1);
  });
});
