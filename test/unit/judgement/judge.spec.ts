import { judge, UnknownMethod } from '../../../shared/judgement';
import { judgementInput, judgedRun, plainCooler, remountedCooler } from '../../support/judgement-input';

const BARE = [
  [41.9, 42.0, 42.1, 41.8],
  [42.2, 42.3, 42.1],
  [41.7, 41.9, 41.8],
];
const COATED = BARE.map((mount) => mount.map((value) => Number((value - 1.2).toFixed(1))));
const codes = (result: ReturnType<typeof judge>) => result.findings.map(({ code }) => code);

describe('which unit is evidence', () => {
  it('mounts, where both coolers were remounted', () => {
    const result = judge(judgementInput([remountedCooler('Coated', COATED), remountedCooler('Bare', BARE)]));
    expect(result.method).toBe('welch-mounts/2');
    expect(result.pairs[0]).toMatchObject({
      unitOfEvidence: 'mount',
      scope: 'mounts',
      flag: 'outside noise',
    });
    expect(result.coolers[0]).toMatchObject({ runs: 10, mounts: 3, units: 3 });
  });

  it('runs, where mounts were not recorded: named so, and not to be signed off', () => {
    const result = judge(
      judgementInput([plainCooler('Coated', COATED.flat()), plainCooler('Bare', BARE.flat())]),
    );
    expect(result.method).toBe('welch-runs/2');
    expect(result.pairs[0]).toMatchObject({
      unitOfEvidence: 'run',
      scope: 'runs only',
      flag: 'outside noise',
    });
    expect(result.words[0].headline).toBe('Outside run-to-run noise, clearly');
    expect(result.pairs[0].tippingMountSpread).toBeGreaterThan(0);
    expect(result.findings.find(({ code }) => code === 'mounts-not-recorded')?.level).toBe('stop');
  });

  it('neither, where only one cooler was remounted: not judged, with the reason', () => {
    const result = judge(
      judgementInput([remountedCooler('Coated', COATED.slice(0, 2)), remountedCooler('Bare', [BARE.flat()])]),
    );
    expect(result.pairs[0]).toMatchObject({ flag: 'not judged', p: null, unitOfEvidence: null });
    expect(result.pairs[0].notJudged?.code).toBe('mixed mounts');
    expect(result.pairs[0].gap).toBeCloseTo(-1.105, 12);
  });
});

describe('awkward data', () => {
  it('single run each: a gap, and nothing to judge it by', () => {
    const result = judge(judgementInput([plainCooler('A', [41.2]), plainCooler('B', [42])]));
    expect(result.pairs[0]).toMatchObject({
      flag: 'not judged',
      standardError: null,
      p: null,
      interval: null,
    });
    expect(result.words[0].headline).toBe('Not judged: single run each');
    expect(result.pairs[0].gap).toBeCloseTo(-0.8, 12);
  });

  it('two runs of one: the interval is shown, the call withheld', () => {
    const result = judge(
      judgementInput([plainCooler('A', [41.2, 41.3]), plainCooler('B', [42, 42.1, 42.2])]),
    );
    expect(result.pairs[0].flag).toBe('not judged');
    expect(result.pairs[0].interval).not.toBeNull();
    expect(result.pairs[0].notJudged?.code).toBe('too few runs');
  });

  it('two mounts each: judged, and said to be few', () => {
    const result = judge(
      judgementInput([remountedCooler('A', COATED.slice(0, 2)), remountedCooler('B', BARE.slice(0, 2))]),
    );
    expect(result.pairs[0].flag).not.toBe('not judged');
    expect(codes(result)).toContain('two-mounts');
  });

  it('no spread anywhere: no p of 0 or 1, but no call', () => {
    const same = judge(judgementInput([plainCooler('A', [41, 41, 41]), plainCooler('B', [41, 41, 41])]));
    expect(same.pairs[0]).toMatchObject({ gap: 0, p: null, flag: 'not judged' });
    expect(same.words[0].headline).toBe('Not judged: no spread measured');
    const apart = judge(judgementInput([plainCooler('A', [40, 40, 40]), plainCooler('B', [41, 41, 41])]));
    expect(apart.pairs[0]).toMatchObject({ gap: -1, p: null, flag: 'not judged' });
  });

  it('one cooler without spread: the other’s degrees of freedom', () => {
    const result = judge(
      judgementInput([plainCooler('A', [40, 40, 40, 40]), plainCooler('B', [41, 41.4, 41.2, 41.1])]),
    );
    expect(result.pairs[0].degreesOfFreedom).toBeCloseTo(3, 12);
    expect(codes(result)).toContain('no-spread-one-side');
  });
});

describe('size of a gap', () => {
  const call = (gapThatMatters: number) =>
    judge(
      judgementInput([remountedCooler('Coated', COATED), remountedCooler('Bare', BARE)], {
        thresholds: { confidence: 0.95, power: 0.8, gapThatMatters },
      }),
    );
  it('matters, is too small to matter, or is open', () => {
    expect(call(0.3).pairs[0].sizeCall).toBe('matters');
    expect(call(1.2).pairs[0].sizeCall).toBe('size open');
    expect(call(5).pairs[0]).toMatchObject({ sizeCall: 'too small to matter', flag: 'outside noise' });
    expect(call(5).words[0].headline).toBe('Outside noise, smaller than matters');
  });
  it('an unresolved verdict says what it could be', () => {
    const { words } = judge(
      judgementInput([plainCooler('A', [40, 42, 41, 43, 39]), plainCooler('B', [41, 42, 40, 43, 41.5])]),
    );
    expect(words[0].headline).toBe('Within run-to-run noise, unresolved');
    expect(words[0].secondLine).toMatch(/could be from −\d/);
  });
});

describe('order of testing', () => {
  const ordered = (name: string, values: readonly number[], places: readonly number[]) => ({
    ...plainCooler(name, values),
    mounts: [
      {
        name: '',
        runs: values.map((value, index) =>
          judgedRun(value, { name: String(index + 1), order: places[index] }),
        ),
      },
    ],
  });
  // A pure drift of 0.1 a run with a little scatter; no gap at all.
  const scatter = [0.02, -0.01, 0.015, -0.02, 0.01, 0, -0.015, 0.02, -0.01, 0.005];
  const drifting = (places: readonly number[]) =>
    places.map((place, index) => 40 + 0.1 * place + scatter[index % 10]);

  it('one cooler before the other: a drift is not called a gap', () => {
    const first = [1, 2, 3, 4, 5];
    const second = [6, 7, 8, 9, 10];
    const result = judge(
      judgementInput([ordered('A', drifting(first), first), ordered('B', drifting(second), second)]),
    );
    expect(result.pairs[0].flag).toBe('not judged');
    expect(result.pairs[0].notJudged?.code).toBe('order confounded');
    expect(codes(result)).toContain('order-not-mixed');
  });
  it('mixed order: drift is found, and does not withhold the call', () => {
    const first = [1, 4, 5, 8, 9];
    const second = [2, 3, 6, 7, 10];
    const result = judge(
      judgementInput([ordered('A', drifting(first), first), ordered('B', drifting(second), second)]),
    );
    expect(result.pairs[0].flag).toBe('within noise');
    expect(result.findings.find(({ code }) => code === 'drift')?.level).toBe('caution');
    expect(codes(result)).toContain('order');
  });
  it('unknown order is said', () => {
    expect(
      codes(judge(judgementInput([remountedCooler('A', COATED), remountedCooler('B', BARE)]))),
    ).toContain('order-unknown');
  });
});

describe('conditions of the runs', () => {
  const cooler = (name: string, fields: Parameters<typeof judgedRun>[1]) => ({
    name,
    mountsRecorded: true,
    mounts: BARE.map((values, mount) => ({
      name: String(mount + 1),
      runs: values.map((value, run) => judgedRun(value, { name: String(run + 1), ...fields })),
    })),
  });
  const checked = (fieldsA: Parameters<typeof judgedRun>[1], fieldsB: Parameters<typeof judgedRun>[1]) =>
    codes(judge(judgementInput([cooler('A', fieldsA), cooler('B', fieldsB)], { nominalWatts: 180 })));

  it('power that differs is worth degrees', () => {
    expect(checked({ watts: 181.5 }, { watts: 179.9 })).toContain('watts-differ');
    expect(checked({ watts: 180.02 }, { watts: 180 })).toContain('heat-load');
    expect(checked({ watts: 190 }, { watts: 190 })).toContain('watts-off');
  });
  it('ambient that moved or stood apart is told', () => {
    expect(checked({ ambientRange: 1.4, ambient: 22 }, { ambientRange: 0.2, ambient: 22 })).toContain(
      'ambient-moved',
    );
    expect(checked({ ambient: 22 }, { ambient: 24 })).toContain('ambient-differs');
  });
  it('a run that had not settled blocks sign-off', () => {
    const result = judge(
      judgementInput([cooler('A', { settled: 'not settled' }), cooler('B', { settled: 'settled' })]),
    );
    expect(result.findings[0]).toMatchObject({ code: 'not-settled', level: 'stop' });
  });
  it('resistance takes the gap that matters over the median power', () => {
    const result = judge(
      judgementInput([cooler('A', { watts: 200 }), cooler('B', { watts: 200 })], { metric: 'resistance' }),
    );
    expect(result.unit).toBe('K/W');
    expect(result.pairs[0].gapThatMatters).toBeCloseTo(1 / 200, 15);
  });
});

describe('the same input gives the same bits', () => {
  it('whatever the order of runs and mounts', () => {
    const turned = (mounts: number[][]) => [...mounts].reverse().map((mount) => [...mount].reverse());
    const straight = judge(judgementInput([remountedCooler('A', COATED), remountedCooler('B', BARE)]))
      .pairs[0];
    const shuffled = judge(
      judgementInput([remountedCooler('A', turned(COATED)), remountedCooler('B', turned(BARE))]),
    ).pairs[0];
    for (const key of [
      'gap',
      'standardError',
      'degreesOfFreedom',
      'p',
      'marginOfError',
      'smallestVisibleGap',
    ] as const)
      expect(shuffled[key]).toBe(straight[key]);
  });
  it('and an unknown method is refused by name', () => {
    expect(() =>
      judge(judgementInput([plainCooler('A', [1, 2, 3]), plainCooler('B', [1, 2, 3])]), 'welch-mounts/99'),
    ).toThrow(UnknownMethod);
  });
});

it('a left-out run is named with what it would change', () => {
  const outlier = judgedRun(48, { name: '9' });
  const result = judge(
    judgementInput([remountedCooler('A', COATED), remountedCooler('B', BARE)], {
      leftOut: [{ cooler: 'A', mount: '1', run: outlier, reason: 'fan cable loose' }],
    }),
  );
  expect(result.findings.find(({ code }) => code === 'runs-left-out')?.text).toMatch(/1 run was left out/);
});
