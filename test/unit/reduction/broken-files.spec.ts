import type { ColumnMap, RunFinding } from '../../../shared/contracts';
import { reduceRun, startReading } from '../../../shared/reduction';
import { MENDED } from './mended-files';
import { Random } from './random';
import { REFUSED_FILES } from './refused-files';
import { REFUSED_LOGS } from './refused-logs';
import { utf8 } from './sound-log';
import { writtenLog } from './written-log';

interface Outcome {
  readonly problems: readonly { code: string; row: number | null; column: string | null; text: string }[];
  readonly findings: readonly RunFinding[];
  readonly summary: ReturnType<typeof reduceRun>['summary'];
}

function outcomeOf(bytes: Uint8Array, columnMap: ColumnMap | null = null, chunk = 50_000): Outcome {
  const reading = startReading('B4-run1.csv', { columnMap });
  for (let at = 0; at < bytes.length; at += chunk) reading.write(bytes.subarray(at, at + chunk));
  const { log, problems } = reading.end();
  if (!log) return { problems, findings: [], summary: null };
  const reduced = reduceRun(log, { columnMap, fixedAmbient: null, window: null, nominalWatts: null });
  return {
    problems: [...problems, ...reduced.problems],
    findings: reduced.summary?.findings ?? [],
    summary: reduced.summary,
  };
}

const INSERTED = ['"', '\n', ',', ';', '\0', '∞', '9'.repeat(400)];
const joined = (...parts: Uint8Array[]): Uint8Array => new Uint8Array(Buffer.concat(parts));

/** What a sentence for a tester must be. */
function expectPlainSentence(text: string): void {
  expect(text).toMatch(/^[A-Z“0-9].*[.]$/s);
  expect(text).not.toMatch(/undefined|NaN|null|\[object|Infinity|Error:|!|please/i);
  expect(text.length).toBeLessThan(420);
}

describe('a broken file', () => {
  it.each([...REFUSED_FILES, ...REFUSED_LOGS])(
    '$what is refused in a sentence a tester can act on',
    ({ bytes, code, row, column, says, columnMap }) => {
      const { summary, problems } = outcomeOf(bytes, columnMap);
      expect(summary).toBeNull();
      expect(problems.map((problem) => problem.code)).toContain(code);
      const problem = problems.find((candidate) => candidate.code === code)!;
      expect(problem.text).toMatch(says);
      if (row !== undefined) expect(problem.row).toBe(row);
      if (column !== undefined) expect(problem.column).toBe(column);
      problems.forEach(({ text }) => expectPlainSentence(text));
    },
  );

  it.each(MENDED)('$what still gives its run, and says so', ({ bytes, code, says, readings }) => {
    const { summary, problems, findings } = outcomeOf(bytes);
    expect(problems).toEqual([]);
    expect(findings.map((finding) => finding.code)).toContain(code);
    expect(findings.find((finding) => finding.code === code)!.text.replaceAll('\u00a0', ' ')).toMatch(says);
    if (readings !== undefined) expect(summary!.readings).toBe(readings);
    findings.forEach(({ text }) => expectPlainSentence(text));
  });

  it('reads the same whatever the size of the chunks', () => {
    for (const { bytes, columnMap } of [
      ...REFUSED_FILES,
      ...REFUSED_LOGS,
      ...MENDED.map((mended) => ({ ...mended, columnMap: undefined })),
    ]) {
      if (bytes.length > 60_000) continue;
      expect(outcomeOf(bytes, columnMap, 997)).toEqual(outcomeOf(bytes, columnMap));
    }
  });

  it('never throws and never answers nothing, over 300 logs damaged at random', () => {
    for (let seed = 1; seed <= 300; seed += 1) {
      const r = new Random(seed * 31);
      let bytes: Uint8Array = Uint8Array.from(writtenLog(seed).bytes);
      for (let damage = r.whole(1, 12); damage > 0; damage -= 1) {
        const at = r.whole(0, bytes.length - 1);
        const kind = r.whole(0, 3);
        if (kind === 0) bytes[at] = r.whole(0, 255);
        else if (kind === 1) bytes = joined(bytes.subarray(0, at), bytes.subarray(at + r.whole(1, 3000)));
        else if (kind === 2)
          bytes = joined(bytes.subarray(0, at), utf8(r.pick(INSERTED)), bytes.subarray(at));
        else bytes = bytes.slice(0, Math.max(1, at));
        if (bytes.length === 0) bytes = Uint8Array.from([10]);
      }
      const { summary, problems } = outcomeOf(bytes, null, r.pick([64, 5000, 1_000_000]));
      expect({ seed, answered: summary !== null || problems.length > 0 }).toEqual({ seed, answered: true });
      problems.forEach(({ text }) => expectPlainSentence(text));
      if (summary) expect(Number.isFinite(summary.rise)).toBe(true);
    }
  });
});
