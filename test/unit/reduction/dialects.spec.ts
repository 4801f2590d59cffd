import { startReading } from '../../../shared/reduction';
import { Random } from './random';
import { writtenLog } from './written-log';

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

const COMBINATIONS = 500;

describe('logs of any dialect', () => {
  it(`give back the numbers they were written with, over ${COMBINATIONS} combinations at random`, () => {
    for (let seed = 1; seed <= COMBINATIONS; seed += 1) {
      const written = writtenLog(seed);
      const { log, problems } = readInChunks(written.bytes, seed);
      const where = JSON.stringify(written.variation);
      expect({ where, problems: problems.map(({ code }) => code) }).toEqual({
        where,
        problems: written.problems,
      });
      expect({ where, map: log!.columnMap }).toEqual({ where, map: written.positions });
      expect({ where, rows: [...log!.rows] }).toEqual({ where, rows: written.rows });
      const late = log!.seconds.findIndex((t, i) => Math.abs(t - written.seconds[i]) > 1e-3);
      expect({ where, late }).toEqual({ where, late: -1 });
      const { heatSource, ambient, watts, fanSpeed } = written.positions;
      const kept = (position: number | null) => (position === null ? null : [...log!.kept.get(position)!]);
      expect({ where, heat: kept(heatSource) }).toEqual({ where, heat: written.heat });
      expect({ where, ambient: kept(ambient) }).toEqual({ where, ambient: written.ambient });
      expect({ where, watts: kept(watts) }).toEqual({ where, watts: written.watts });
      expect({ where, fan: kept(fanSpeed) }).toEqual({ where, fan: written.fan });
      expect({ where, startedAt: log!.startedAt }).toEqual({ where, startedAt: written.startedAt });
    }
  });
});
