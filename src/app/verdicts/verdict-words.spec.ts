import { conditionInWords, countsInWords, signatures, stateInWords, VerdictStep } from './verdict-words';

const step = (action: VerdictStep['action'], at: string, role = 'lead'): VerdictStep => ({
  action,
  at,
  role,
  by: `someone with role ${role}`,
  comment: null,
});

describe('words of a verdict', () => {
  it('says the load once', () => {
    const condition = (name: string, nominalWatts: number | null) =>
      conditionInWords({ id: '', name, nominalWatts }).replace(/\u00a0/g, ' ');
    expect(condition('stock load', 180)).toBe('stock load, 180 W');
    expect(condition('180 W on the test head', 180)).toBe('180 W on the test head');
    expect(condition('1180 W', 180)).toBe('1180 W, 180 W');
    expect(condition('stock load', null)).toBe('stock load');
  });

  it('counts runs and mounts together where the coolers agree, apart where not', () => {
    const counts = (...coolers: [string, number, number | null][]) =>
      countsInWords(coolers.map(([name, runs, mounts]) => ({ name, runs, mounts }))).replace(/\u00a0/g, ' ');
    expect(counts(['A', 10, 5], ['B', 10, 5])).toBe('10 runs, 5 mounts each');
    expect(counts(['A', 10, 5], ['B', 1, 1])).toBe('A: 10 runs, 5 mounts; B: 1 run, 1 mount');
    expect(counts(['A', 3, null], ['B', 3, null])).toBe('3 runs each, mounts not recorded');
  });

  it('says since when a verdict waits', () => {
    const now = new Date(2026, 2, 12, 15, 0);
    const stateSince = new Date(2026, 2, 12, 9, 41).toISOString();
    expect(stateInWords({ state: 'submitted', stateSince }, now)).toBe(
      'Waiting for a lead’s sign-off since 12 Mar 09:41',
    );
    expect(stateInWords({ state: 'signed off', stateSince }, now)).toBe('Signed off 12 Mar 09:41');
  });
});

describe('signatures', () => {
  const verdict = { preparedBy: 'Ada', judgedAt: '2026-03-01T09:00:00Z' };

  it('has the preparer only until the verdict is submitted', () => {
    expect(
      signatures({ ...verdict, state: 'judged', steps: [step('judged', '2026-03-01T09:00:00Z')] }),
    ).toEqual({
      prepared: { by: 'Ada', at: '2026-03-01T09:00:00Z', submitted: false },
      lead: null,
      auditor: null,
    });
  });

  it('takes the submission back when the lead sends it back', () => {
    const steps = [
      step('submitted', '2026-03-02T09:00:00Z', 'analyst'),
      step('sent back', '2026-03-03T09:00:00Z'),
    ];
    expect(signatures({ ...verdict, state: 'sent back', steps }).prepared.submitted).toBe(false);
  });

  it('counts a re-run as the auditor’s signature only after sign-off, and only by an auditor', () => {
    const signed = step('signed off', '2026-03-03T09:00:00Z');
    const of = (...re: VerdictStep[]) =>
      signatures({ ...verdict, state: 'signed off', steps: [signed, ...re] }).auditor;
    expect(of(step('re-run', '2026-03-02T09:00:00Z', 'auditor'))).toBeNull();
    expect(of(step('re-run', '2026-03-04T09:00:00Z', 'lead'))).toBeNull();
    expect(of(step('re-run', '2026-03-04T09:00:00Z', 'auditor'))?.at).toBe('2026-03-04T09:00:00Z');
  });
});
