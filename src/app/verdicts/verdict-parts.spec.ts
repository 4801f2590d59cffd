import { Type } from '@angular/core';
import { TestBed } from '@angular/core/testing';
import { provideRouter } from '@angular/router';
import { verdictSchema } from '../../../shared/contracts';
import { Numbers } from './numbers';
import { PairTable } from './pair-table';
import { Provenance } from './provenance';
import { ReRunResult } from './re-run-result';
import { SignOffStrip } from './sign-off-strip';
import { FIN_PAIR_RESULT, finVerdict, id } from './verdict-fixture';
import { WhatWouldChange } from './what-would-change';

async function show<T>(part: Type<T>, inputs: Record<string, unknown>): Promise<HTMLElement> {
  TestBed.configureTestingModule({ providers: [provideRouter([])] });
  const fixture = TestBed.createComponent(part);
  for (const [name, value] of Object.entries(inputs)) fixture.componentRef.setInput(name, value);
  await fixture.whenStable();
  return fixture.nativeElement as HTMLElement;
}
const text = (element: Element | null): string => (element?.textContent ?? '').replace(/\s+/g, ' ').trim();
const rows = (page: HTMLElement, table = 'table'): string[][] =>
  [...page.querySelectorAll(`${table} tbody tr`)].map((row) => [...row.children].map((cell) => text(cell)));

it('has a fixture that keeps the contract', () => {
  expect(() => verdictSchema.parse(finVerdict())).not.toThrow();
});

describe('Numbers', () => {
  const verdict = finVerdict();

  it('shows means, spreads and intervals, the reference first, and the gap', async () => {
    const page = await show(Numbers, { verdict, pair: FIN_PAIR_RESULT });
    expect(rows(page, '.wide table')).toEqual([
      ['Bare fins reference', '10', '5', '41.94', '0.11', '0.41', '41.41 to 42.46'],
      ['Coated fins', '10', '5', '41.31', '0.12', '0.39', '40.81 to 41.81'],
      ['Gap, Coated fins − Bare fins', '', '', '−0.63', '', '', '−1.23 to −0.02'],
    ]);
  });

  it('shows all digits on demand, exactly as stored', async () => {
    const page = await show(Numbers, { verdict, pair: FIN_PAIR_RESULT });
    expect(text(page)).not.toContain('0.6259999999999977');
    page.querySelector('button')!.click();
    TestBed.tick();
    expect(text(page)).toContain('−0.6259999999999977 °C');
  });

  it('says what counting runs alone would have said, only where mounts were the evidence', async () => {
    const sentence =
      'Counting all 20 runs as independent, Welch’s test would have said ±0.37 °C, gap ÷ margin 1.69×';
    expect(text(await show(Numbers, { verdict, pair: FIN_PAIR_RESULT }))).toContain(sentence);
    TestBed.resetTestingModule();
    const runsOnly = { ...FIN_PAIR_RESULT, scope: 'runs only' };
    expect(text(await show(Numbers, { verdict, pair: runsOnly }))).not.toContain('Counting all');
  });

  it('says when a spread was set to zero', async () => {
    const coolers = verdict.judgement.coolers.map((cooler) => ({
      ...cooler,
      spreadBetweenMounts: 0,
      spreadBetweenMountsTruncated: true,
    }));
    const page = await show(Numbers, {
      verdict: { ...verdict, judgement: { ...verdict.judgement, coolers } },
      pair: FIN_PAIR_RESULT,
    });
    expect(text(page)).toContain('* The estimate came out below zero and counts as 0');
  });
});

describe('WhatWouldChange', () => {
  const verdict = finVerdict();

  it('starts from now and counts the runs to add for both coolers', async () => {
    const page = await show(WhatWouldChange, { verdict, pair: FIN_PAIR_RESULT });
    expect(rows(page).slice(0, 2)).toEqual([
      ['5 mounts, 10 runs now', '', '±0.60', '1.04×'],
      ['7 mounts, 14 runs', '+8', '±0.48', '1.30×'],
    ]);
  });

  it('says what this evidence can see and how much hangs on single mounts', async () => {
    const words = text(await show(WhatWouldChange, { verdict, pair: FIN_PAIR_RESULT }));
    expect(words).toContain(
      'finds a gap of 0.83 °C four times in five; a gap of 0.50 °C, the smallest that matters, is found less often.',
    );
    expect(words).toContain('Leaving out any one of 6 of the 10 mounts would change the call');
  });

  it('says so when no single mount would change the call', async () => {
    const leaveOneOut = { unit: 'mount', units: 10, tips: 0, which: [] };
    const page = await show(WhatWouldChange, { verdict, pair: { ...FIN_PAIR_RESULT, leaveOneOut } });
    expect(text(page)).toContain('Leaving out any single mount of the 10 keeps the call.');
  });
});

describe('SignOffStrip', () => {
  const strip = (changes: Parameters<typeof finVerdict>[0], roles: string[]) =>
    show(SignOffStrip, { verdict: finVerdict(changes), roles });
  const buttons = (page: HTMLElement) => [...page.querySelectorAll('button')];
  const may = { submit: false, signOff: false, sendBack: false, withdraw: false, reRun: false };

  it('offers a lead to send back or sign off, sign-off last', async () => {
    const page = await strip({}, ['lead']);
    expect(buttons(page).map((button) => text(button))).toEqual([
      'Send back with a note',
      'Sign off this verdict',
    ]);
    expect(text(page)).toContain('not signed');
  });

  it('tells the lead who prepared the study why another signs it', async () => {
    const why = 'You prepared this study. Another lead signs it off.';
    const page = await strip({ may: { ...may, sendBack: true }, mayNot: { signOff: why } }, ['lead']);
    const [signOff] = buttons(page);
    expect(signOff.getAttribute('aria-disabled')).toBe('true');
    expect(text(page.querySelector(`#${signOff.getAttribute('aria-describedby')!}`))).toBe(why);
  });

  it('does not offer to others what only a lead does', async () => {
    const page = await strip({ may, mayNot: { signOff: 'This is for the lead.' } }, ['analyst']);
    expect(buttons(page)).toEqual([]);
    expect(text(page)).not.toContain('This is for the lead.');
  });
});

describe('PairTable', () => {
  it('marks every pair by shape and ratio and links to it', async () => {
    const pairs = [
      { ...FIN_PAIR_RESULT, a: 'T1', b: 'T2', flag: 'within noise', clearance: 0.998 },
      { ...FIN_PAIR_RESULT, a: 'T1', b: 'T3' },
      { ...FIN_PAIR_RESULT, a: 'T2', b: 'T3', clearance: 1.001 },
    ];
    const headlines = ['Within noise, unresolved', 'Outside noise', 'Outside noise, only just'];
    const page = await show(PairTable, { pairs, headlines, coolers: ['T1', 'T2', 'T3'], current: 1 });
    expect(rows(page)).toEqual([
      ['T1', '0.99×', '1.04×'],
      ['T2', '', '1.01×'],
    ]);
    const current = page.querySelector('a[aria-current]');
    expect(current?.getAttribute('aria-label')).toBe('T1 against T3: Outside noise, 1.04×');
    expect(current?.getAttribute('href')).toContain('pair=2');
  });
});

describe('Provenance', () => {
  it('leads to the export and to every log as brought in', async () => {
    const page = await show(Provenance, { verdict: finVerdict() });
    const links = [...page.querySelectorAll('a')].map((link) => link.getAttribute('href'));
    expect(links[0]).toBe(`/api/verdicts/${id(1)}/export`);
    expect(links).toHaveLength(21);
    expect(links).toContain(`/api/runs/${id(119)}/log`);
  });

  it('offers a re-run only to those who may', async () => {
    const verdict = finVerdict({ may: { ...finVerdict().may, reRun: false } });
    const page = await show(Provenance, { verdict });
    expect(page.querySelector('button')).toBeNull();
  });
});

describe('ReRunResult', () => {
  const reRun = {
    verdictId: id(1),
    result: 'differs',
    at: '2026-03-12T10:02:00Z',
    by: 'Auditor 1',
    logsRead: 20,
    fieldsCompared: 312,
    differences: [{ path: 'judgement.pairs[0].marginOfError', stored: '0.17', reRun: '0.18' }],
    reason: null,
    engine: { stored: '1.0.0', now: '1.1.0' },
    method: 'welch-mounts/1',
  };

  it('says identical to the last digit', async () => {
    const page = await show(ReRunResult, { reRun: { ...reRun, result: 'identical', differences: [] } });
    expect(text(page)).toContain('Identical: every field, to the last digit');
    expect(page.querySelector('table')).toBeNull();
  });

  it('lists every field that differs, and says whether the call does', async () => {
    const page = await show(ReRunResult, { reRun });
    expect(rows(page)).toEqual([['judgement.pairs[0].marginOfError', '0.17', '0.18']]);
    expect(text(page)).toContain('verdict unchanged');
    TestBed.resetTestingModule();
    const flag = { path: 'judgement.pairs[0].flag', stored: '"outside noise"', reRun: '"within noise"' };
    const changed = await show(ReRunResult, { reRun: { ...reRun, differences: [flag] } });
    expect(text(changed)).toContain('Differs, verdict changes');
  });
});
