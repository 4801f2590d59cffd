import { createHash } from 'node:crypto';
import { DEMO, DemoLog, SAMPLE, demoLogs, sampleLogs } from '../../../server/cli/demo';
import { judge } from '../../../shared/judgement';
import { JudgedCooler } from '../../../shared/contracts/judgement';
import { RunSummary } from '../../../shared/contracts/run-summary';
import { guessFromName, matchCooler, reduceRun, startReading } from '../../../shared/reduction';
import { judgedRun, judgementInput } from '../../support/judgement-input';

interface ReducedDemoLog extends DemoLog {
  readonly summary: RunSummary;
}

function reduced(log: DemoLog, nominalWatts: number): ReducedDemoLog {
  const reading = startReading(log.fileName);
  reading.write(log.bytes);
  const read = reading.end();
  const { summary, problems } = reduceRun(read.log!, {
    columnMap: null,
    fixedAmbient: null,
    window: null,
    nominalWatts,
  });
  expect({ file: log.fileName, problems: [...read.problems, ...problems] }).toEqual({
    file: log.fileName,
    problems: [],
  });
  return { ...log, summary: summary! };
}

/** A cooler's runs under one condition as the judgement sees them. */
function evidence(logs: readonly ReducedDemoLog[], cooler: string): JudgedCooler {
  const own = logs.filter((log) => log.cooler === cooler);
  const mounts = [...new Set(own.map(({ mount }) => mount))];
  return {
    name: cooler,
    mountsRecorded: true,
    mounts: mounts.map((name) => ({
      name,
      runs: own
        .filter(({ mount }) => mount === name)
        .map(({ run, order, summary }) =>
          judgedRun(summary.rise, {
            name: run,
            order,
            ambient: summary.ambient.mean,
            ambientRange: summary.ambient.highest - summary.ambient.lowest,
            watts: summary.watts!.mean,
            fanSpeed: summary.fanSpeed!.mean,
            settled: summary.window.settled,
            sensorStep: summary.sensorStep,
            withinStandardDeviation: summary.within.standardDeviation,
          }),
        ),
    })),
  };
}

const judged = (logs: readonly ReducedDemoLog[], coolers: readonly string[], nominalWatts: number) =>
  judge(
    judgementInput(
      coolers.map((cooler) => evidence(logs, cooler)),
      {
        thresholds: { confidence: 0.95, power: 0.8, gapThatMatters: 0.5 },
        nominalWatts,
      },
    ),
  );

describe('the demonstration', () => {
  const logs = demoLogs().map((log) =>
    reduced(log, DEMO.conditions.find(({ name }) => name === log.condition)!.nominalWatts),
  );
  const under = (condition: string) => logs.filter((log) => log.condition === condition);

  it('is forty logs: two coolers, two loads, ten runs each over three mounts of 4, 3 and 3', () => {
    expect(logs).toHaveLength(40);
    for (const cooler of DEMO.coolers) {
      for (const { name } of DEMO.conditions) {
        const mounts = under(name)
          .filter((log) => log.cooler === cooler)
          .map(({ mount }) => mount);
        expect(mounts.sort().join('')).toBe('1111222333');
      }
    }
    expect(logs.map(({ order }) => order)).toEqual(logs.map((_, i) => i + 1));
    expect(new Set(logs.map(({ fileName }) => fileName)).size).toBe(40);
  });

  it('is the same bytes every time', () => {
    const digest = (list: readonly DemoLog[]) =>
      list.map(({ bytes }) => createHash('sha256').update(bytes).digest('hex'));
    expect(digest(demoLogs())).toEqual(digest(logs));
  });

  it('settles in every run, starts when it says, and is named so that names tell cooler, load, mount and run', () => {
    for (const log of logs) {
      expect({ file: log.fileName, settled: log.summary.window.settled }).toEqual({
        file: log.fileName,
        settled: 'settled',
      });
      expect(log.summary.startedAt).toBe(log.startedAt);
      const guess = guessFromName(log.fileName);
      expect(matchCooler(guess.cooler!, DEMO.coolers)).toBe(log.cooler);
      expect(log.condition.toLowerCase().startsWith(guess.condition!)).toBe(true);
      expect([guess.mount, guess.run]).toEqual([log.mount, log.run]);
    }
  });

  it('has a gap just outside noise under the raised load', () => {
    const [pair] = judged(under('Raised load'), DEMO.coolers, 180).pairs;
    expect(pair).toMatchObject({ flag: 'outside noise', scope: 'mounts', a: 'Coated fins', b: 'Bare fins' });
    expect(pair.clearance!).toBeGreaterThan(1);
    expect(pair.clearance!).toBeLessThan(1.2);
    // The truth the logs were made from: 180 W times the difference in K/W.
    expect(Math.abs(pair.gap! - 180 * (0.1461 - 0.15))).toBeLessThan(pair.marginOfError!);
  });

  it('has no gap under the stock load, where truly there is none', () => {
    const [pair] = judged(under('Stock load'), DEMO.coolers, 120).pairs;
    expect(pair.flag).toBe('within noise');
    expect(pair.clearance!).toBeLessThan(0.5);
  });

  it('keeps either cooler from having the later runs to itself', () => {
    for (const { name, nominalWatts } of DEMO.conditions) {
      const { findings } = judged(under(name), DEMO.coolers, nominalWatts);
      expect(findings.filter(({ level }) => level === 'stop')).toEqual([]);
    }
  });
});

describe('the logs to try the intake with', () => {
  it('are twenty, each readable, and show a gap well outside noise', () => {
    const logs = sampleLogs().map((log) => reduced(log, 120));
    expect(logs).toHaveLength(20);
    // All tell when they were started, so that the intake knows the order of testing.
    expect(logs.map(({ summary }) => summary.startedAt)).toEqual(logs.map(({ startedAt }) => startedAt));
    expect(judged(logs, SAMPLE.coolers, 120).pairs[0]).toMatchObject({
      flag: 'outside noise',
      sizeCall: 'matters',
    });
    const codes = new Set(logs.flatMap(({ summary }) => summary.findings.map(({ code }) => code)));
    expect([...codes].sort()).toEqual(['blank-cells', 'end-block', 'last-row-cut', 'time-gap']);
  });
});
