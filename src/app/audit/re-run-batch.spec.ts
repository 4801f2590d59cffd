import { TestBed } from '@angular/core/testing';
import { Subject } from 'rxjs';
import { ReRun } from '../../../shared/contracts';
import { AuditClient } from './audit-client';
import { ReRunBatch } from './re-run-batch';

describe('ReRunBatch', () => {
  let asked: { id: string; answer: Subject<ReRun> }[];
  let batch: ReRunBatch;
  const identical = (verdictId: string): ReRun => ({
    verdictId,
    result: 'identical',
    at: '2026-03-12T10:00:00Z',
    by: 'Auditor 1',
    logsRead: 20,
    fieldsCompared: 312,
    differences: [],
    reason: null,
    engine: { stored: '1.0.0', now: '1.0.0' },
    method: 'welch-mounts/1',
  });
  const answer = (place: number): void => {
    asked[place].answer.next(identical(asked[place].id));
    asked[place].answer.complete();
  };

  beforeEach(() => {
    asked = [];
    const reRun = (id: string): Subject<ReRun> => {
      const answer = new Subject<ReRun>();
      asked.push({ id, answer });
      return answer;
    };
    TestBed.configureTestingModule({
      providers: [ReRunBatch, { provide: AuditClient, useValue: { reRun } }],
    });
    batch = TestBed.inject(ReRunBatch);
  });

  it('asks for the next only when the one before is done', () => {
    batch.start(['a', 'b', 'c']).subscribe();
    expect(asked.map(({ id }) => id)).toEqual(['a']);
    answer(0);
    expect(asked.map(({ id }) => id)).toEqual(['a', 'b']);
    expect([batch.done(), batch.current(), batch.running()]).toEqual([1, 'b', true]);
    answer(1);
    answer(2);
    expect([batch.done(), batch.running()]).toEqual([3, false]);
    expect(batch.outcomes().get('c')).toMatchObject({ kind: 'done', reRun: { result: 'identical' } });
  });

  it('stops after the one under way', () => {
    let completed = false;
    batch.start(['a', 'b', 'c']).subscribe({ complete: () => (completed = true) });
    answer(0);
    batch.stop();
    expect(batch.running()).toBe(true);
    answer(1);
    expect(asked).toHaveLength(2);
    expect([completed, batch.running(), batch.done(), batch.stopping()]).toEqual([true, false, 2, false]);
  });

  it('goes on past one that fails and keeps its reason', () => {
    batch.start(['a', 'b']).subscribe();
    asked[0].answer.error(new Error('cut off'));
    answer(1);
    expect(batch.outcomes().get('a')).toMatchObject({
      kind: 'failed',
      text: expect.stringContaining('cut off') as string,
    });
    expect(batch.outcomes().get('b')?.kind).toBe('done');
  });

  it('does not start a second batch while one is under way', () => {
    batch.start(['a', 'b']).subscribe();
    batch.start(['c']).subscribe();
    expect(asked.map(({ id }) => id)).toEqual(['a']);
    expect(batch.queue()).toEqual(['a', 'b']);
  });
});
