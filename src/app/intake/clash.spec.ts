import { clashOf, markCopies } from './clash';
import { DroppedLog } from './dropped-log';

const place = (mount: string | null, run: string, coolerId = 'c1', conditionId = 'k1') => ({
  coolerId,
  conditionId,
  mount,
  run,
});

describe('clashOf', () => {
  it('refuses a second run of one name in a mount, blanks around it or not', () => {
    expect(clashOf(place('1', '2'), [place('1', '1'), place('1', ' 2 ')])).toBe('mount 1 has another run 2');
  });

  it('takes the same name in another mount, cooler or condition', () => {
    const others = [place('2', '2'), place('1', '2', 'c2'), place('1', '2', 'c1', 'k2')];
    expect(clashOf(place('1', '2'), others)).toBeNull();
  });

  it('refuses mounts told for some runs of a cooler only', () => {
    expect(clashOf(place(null, '1'), [place('1', '2')])).toMatch(/set for some runs/);
    expect(clashOf(place(null, '1'), [place(null, '2'), place('1', '2', 'c2')])).toBeNull();
  });
});

describe('markCopies', () => {
  const log = (id: number, digest: string | null, state: DroppedLog['state'] = 'read') =>
    ({ id, digest, state, sameAs: null, file: new File([], `${id}.csv`) }) as unknown as DroppedLog;
  const marks = (logs: readonly DroppedLog[], stored: { digest: string; fileName: string }[] = []) =>
    markCopies(logs, stored as never).map(({ sameAs }) => sameAs);

  it('marks the later of two with the same bytes, whichever was read first', () => {
    expect(marks([log(1, 'a'), log(2, 'b'), log(3, 'a')])).toEqual([null, null, '1.csv']);
  });

  it('marks what the study has, by the name it has there', () => {
    expect(marks([log(1, 'a')], [{ digest: 'a', fileName: 'old.csv' }])).toEqual(['old.csv']);
  });

  it('lets a copy be a run once the original is taken out', () => {
    const [, copy] = markCopies([log(1, 'a'), log(2, 'a')], []);
    expect(copy.sameAs).toBe('1.csv');
    expect(marks([copy])).toEqual([null]);
  });

  it('never marks a log that was sent', () => {
    expect(marks([log(1, 'a'), log(2, 'a', 'done')])).toEqual(['2.csv', null]);
  });

  it('says nothing of logs not read yet', () => {
    expect(marks([log(1, null), log(2, null)])).toEqual([null, null]);
  });
});
