import { TestBed } from '@angular/core/testing';
import { Run, Study } from '../../../shared/contracts/studies';
import { LogWorkerStub } from '../../testing/log-worker-stub';
import { IntakeStore } from './intake-store';
import { LogReadout } from './log-messages';
import { LogReaders } from './log-readers';

const STUDY = {
  coolers: [
    { id: 'bare', name: 'Bare fins', reference: true },
    { id: 'coated', name: 'Coated fins', reference: false },
  ],
  conditions: [{ id: 'stock', name: 'Stock load', nominalWatts: 120 }],
} as unknown as Study;

const readout = (startedAt: string | null = null) =>
  ({
    columns: [],
    columnMap: null,
    summary: { rise: 28, watts: null, startedAt, findings: [] },
    sketch: { seconds: [], rise: [], ambient: [] },
    problems: [],
    seconds: 1800,
  }) as unknown as LogReadout;

describe('IntakeStore', () => {
  let store: IntakeStore;
  const worker = (): LogWorkerStub => LogWorkerStub.made[0];
  const ids = (): number[] => store.logs().map(({ id }) => id);
  /** Drops files of these names and answers for the workers, which read one after another. */
  const dropped = (names: readonly string[], starts: readonly (string | null)[] = []): void => {
    store.add(names.map((name) => new File(['x'], name)));
    ids().forEach((id, index) =>
      LogWorkerStub.made
        .find(({ requests }) => requests.some((request) => request.id === id))
        ?.answer({ kind: 'read', id, digest: `digest ${id}`, readout: readout(starts[index] ?? null) }),
    );
  };

  beforeEach(() => {
    LogWorkerStub.made.length = 0;
    TestBed.configureTestingModule({ providers: [IntakeStore, LogReaders] });
    store = TestBed.inject(IntakeStore);
    store.begin(STUDY, []);
  });

  it('reads every log and takes its place from its name', () => {
    dropped(['bare-fins_m1_r1.csv', 'coated-fins_m2_r3.csv']);
    expect(store.counts()).toMatchObject({ all: 2, read: 2, waiting: 0 });
    expect(store.logs()[1].assignment).toEqual({
      coolerId: 'coated',
      conditionId: 'stock',
      mount: '2',
      run: '3',
    });
    expect(store.ready()).toHaveLength(2);
  });

  it('holds a log without a cooler back, saying so, and the others not', () => {
    dropped(['bare-fins_m1_r1.csv', 'nameless_m1_r1.csv']);
    expect(store.missing()).toEqual(new Map([[ids()[1], 'no cooler set']]));
    expect(store.ready()).toHaveLength(1);
  });

  it('holds a run back whose name its mount has in the study already', () => {
    store.begin(STUDY, [
      { coolerId: 'bare', conditionId: 'stock', mount: '1', name: '1', digest: 'other', order: 4 } as Run,
    ]);
    dropped(['bare-fins_m1_r1.csv']);
    expect([...store.missing().values()]).toEqual(['mount 1 has another run 1']);
  });

  it('assigns many at once and takes it back', () => {
    dropped(['nameless_m1_r1.csv', 'nameless_m1_r2.csv']);
    store.assign(new Set(ids()), { coolerId: 'bare' });
    expect(store.ready()).toHaveLength(2);
    store.undo();
    expect(store.logs().map(({ assignment }) => assignment.coolerId)).toEqual([null, null]);
    expect(store.canUndo()).toBe(false);
  });

  it('brings logs back that were left out, in their places, and reads them again', () => {
    dropped(['bare-fins_m1_r1.csv', 'bare-fins_m1_r2.csv', 'bare-fins_m1_r3.csv']);
    const [first, second, third] = ids();
    store.remove(new Set([second]));
    expect(ids()).toEqual([first, third]);
    store.undo();
    expect(ids()).toEqual([first, second, third]);
    const readings = LogWorkerStub.made
      .flatMap(({ requests }) => requests)
      .filter(({ kind, id }) => kind === 'read' && id === second);
    expect(readings).toHaveLength(2);
  });

  it('never takes a sent log out or moves it', () => {
    dropped(['bare-fins_m1_r1.csv']);
    store.sending(new Set(ids()));
    store.remove(new Set(ids()));
    store.assign(new Set(ids()), { mount: '9' });
    expect(store.logs()[0].assignment.mount).toBe('1');
  });

  it('orders by the logs’ clocks when all have one, after the runs of the study', () => {
    store.begin(STUDY, [{ digest: 'other', order: 4 } as Run]);
    dropped(['bare-fins_m1_r1.csv', 'bare-fins_m1_r2.csv'], ['2026-05-18T10:30:00', '2026-05-18T09:30:00']);
    expect(store.order()).toBe('by their clocks');
    expect(store.logs().map((log) => store.orderOf(log))).toEqual([6, 5]);
  });

  it('claims no order without clocks until someone vouches for the list', () => {
    dropped(['bare-fins_m1_r1.csv', 'bare-fins_m1_r2.csv'], ['2026-05-18T10:30:00', null]);
    expect(store.logs().map((log) => store.orderOf(log))).toEqual([null, null]);
    store.chosenOrder.set('as listed');
    expect(store.logs().map((log) => store.orderOf(log))).toEqual([1, 2]);
  });

  it('does not read a log over 200 MB and says what to do', () => {
    const file = new File(['x'], 'huge.csv');
    Object.defineProperty(file, 'size', { value: 201 * 1024 * 1024 });
    store.add([file]);
    expect(store.logs()[0]).toMatchObject({
      state: 'failed',
      trouble: expect.stringMatching(/^Over 200 MB/) as string,
    });
    expect(worker()).toBeUndefined();
  });
});
