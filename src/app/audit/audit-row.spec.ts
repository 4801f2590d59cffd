import { ReRun } from '../../../shared/contracts';
import { finRow, id } from '../verdicts/verdict-fixture';
import { auditRow, pairAsReRun } from './audit-row';
import { drawBatchTicks } from './batch-ticks';
import { batchInWords, listInWords } from './batch-words';
import { asCsv } from '../ui/save-file/save-file';

const reRun = (
  result: ReRun['result'],
  differences: ReRun['differences'] = [],
  reason: string | null = null,
): ReRun => ({
  verdictId: id(1),
  result,
  at: '2026-03-12T10:00:00Z',
  by: 'Auditor 1',
  logsRead: 20,
  fieldsCompared: 312,
  differences,
  reason,
  engine: { stored: '1.0.0', now: '1.1.0' },
  method: 'welch-mounts/1',
});
const margin = { path: 'judgement.pairs[0].marginOfError', stored: '0.17', reRun: '0.18000000000000002' };
const flag = { path: 'judgement.pairs[0].flag', stored: '"outside noise"', reRun: '"within noise"' };
const headline = {
  path: 'judgement.words[0].headline',
  stored: '"Outside noise"',
  reRun: '"Within noise, unresolved"',
};
const result = (...args: Parameters<typeof reRun>) =>
  auditRow(finRow(), { kind: 'done', reRun: reRun(...args) }).result;

describe('a row of the audit', () => {
  it('says what differs in the figure that tells most, and that the verdict stands', () => {
    expect(result('differs', [margin])).toMatchObject({
      level: 'caution',
      head: 'Differs',
      rest: 'margin of error 0.17 → 0.18\u00a0°C; verdict unchanged',
    });
  });

  it('says what the verdict becomes', () => {
    expect(result('differs', [margin, flag, headline])).toMatchObject({
      level: 'stop',
      head: 'Differs, verdict changes',
      rest: 'margin of error 0.17 → 0.18\u00a0°C; verdict becomes Within noise, unresolved',
    });
  });

  it('says why a verdict can’t be re-run', () => {
    expect(result("can't re-run", [], 'B2-run1.csv changed since')).toMatchObject({
      level: 'stop',
      head: 'Can’t re-run',
      rest: 'B2-run1.csv changed since',
    });
  });

  it('takes the last re-run on record until there is a newer one', () => {
    const lastReRun = { at: '2026-03-10T10:00:00Z', by: 'Auditor 1', result: 'differs' } as const;
    expect(auditRow(finRow({ lastReRun }), undefined).result).toMatchObject({ kind: 'differs', reRun: null });
    expect(auditRow(finRow(), undefined).result).toMatchObject({ kind: 'none', level: null });
  });

  it('puts the differing fields of the first pair into the pair as re-run, and no others', () => {
    const other = { path: 'judgement.pairs[1].gap', stored: '1', reRun: '2' };
    const [pair] = finRow().pairs;
    expect(pairAsReRun(pair, reRun('differs', [margin, flag, headline, other]))).toEqual({
      ...pair,
      marginOfError: 0.18000000000000002,
      flag: 'within noise',
      headline: 'Within noise, unresolved',
    });
  });
});

describe('ticks of a batch', () => {
  it('draws one tick a verdict', () => {
    const { paths, each } = drawBatchTicks(['note', 'stop', 'now', 'waiting', 'waiting'], 1328);
    expect(each).toBe(1);
    expect(paths.find(({ state }) => state === 'waiting')?.d.split('M')).toHaveLength(3);
  });

  it('groups where ticks would run together, and never hides one to look at', () => {
    const states = Array.from({ length: 5000 }, (_, i) =>
      i === 3217 ? ('stop' as const) : ('note' as const),
    );
    const { paths, each } = drawBatchTicks(states, 300);
    expect(each).toBe(50);
    expect(paths.find(({ state }) => state === 'stop')?.d.split('M')).toHaveLength(2);
  });
});

describe('words of the audit', () => {
  const results = [result('identical'), result('differs', [margin]), result('differs', [flag])];
  const batch = (changes: object) => ({
    running: () => true,
    stopping: () => false,
    queue: () => ['a', 'b', 'c', 'd'],
    done: () => 3,
    secondsLeft: () => 370,
    ...changes,
  });

  it('says how a batch goes and how long it will take', () => {
    expect(batchInWords(batch({}) as never, results)).toEqual({
      headline: 'Re-running 4 verdicts: 3 done, 1 identical',
      detail: '1 differs with the same verdict, 1 verdict changes. About 6 min left.',
    });
  });

  it('says that it was stopped', () => {
    expect(batchInWords(batch({ running: () => false }) as never, results).headline).toBe(
      'Stopped after 3 of 4 verdicts: 1 identical',
    );
  });

  it('says what a list holds', () => {
    expect(listInWords([...results, auditRow(finRow(), undefined).result]).headline).toBe(
      '4 verdicts: 2 to look at, 1 not re-run yet, 1 identical',
    );
  });
});

describe('table as comma-separated values', () => {
  it('quotes what must be quoted and disarms what a spreadsheet would run', () => {
    expect(asCsv([['a, "b"', -0.5, null, '=1+1']])).toBe('"a, ""b""",-0.5,,\'=1+1\r\n');
  });
});
