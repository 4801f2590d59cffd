import { provideHttpClient, withInterceptors } from '@angular/common/http';
import { HttpTestingController, provideHttpClientTesting } from '@angular/common/http/testing';
import { ComponentFixture, TestBed } from '@angular/core/testing';
import { provideRouter } from '@angular/router';
import { LedgerEntry, Role, VerdictRow } from '../../../shared/contracts';
import { problemInterceptor } from '../core/problem-interceptor';
import { Session } from '../core/session';
import { finRow, id } from '../verdicts/verdict-fixture';
import { AuditPage } from './audit-page';
import { LedgerPage } from './ledger-page';

// Whole pages in a simulated browser, on machines that do other work at the same time.
jest.setTimeout(30_000);

const text = (element: Element | null): string => (element?.textContent ?? '').replace(/\s+/g, ' ').trim();
let http: HttpTestingController;

function configure(...roles: Role[]): void {
  TestBed.configureTestingModule({
    providers: [
      provideHttpClient(withInterceptors([problemInterceptor])),
      provideHttpClientTesting(),
      provideRouter([]),
      {
        provide: Session,
        useValue: { has: (...wanted: Role[]) => wanted.some((role) => roles.includes(role)) },
      },
    ],
  });
  http = TestBed.inject(HttpTestingController);
}

describe('AuditPage', () => {
  let fixture: ComponentFixture<AuditPage>;
  const page = (): HTMLElement => fixture.nativeElement as HTMLElement;
  const rows = (): string[] => [...page().querySelectorAll('.audit > tbody > tr')].map((row) => text(row));
  const press = async (name: string): Promise<void> => {
    const found = [...page().querySelectorAll('button')].find(
      (button) => (button.getAttribute('aria-label') ?? text(button)) === name,
    );
    if (!found) throw new Error(`no button "${name}"`);
    found.click();
    await fixture.whenStable();
  };
  const named = (number: number, name: string, changes: Partial<VerdictRow> = {}): VerdictRow =>
    finRow({ id: id(number), study: { id: id(number + 100), name }, state: 'signed off', ...changes });
  const answer = async (
    number: number,
    result: 'identical' | 'differs',
    differences: object[] = [],
  ): Promise<void> => {
    http.expectOne(`/api/verdicts/${id(number)}/re-run`).flush({
      verdictId: id(number),
      result,
      at: '2026-03-12T10:00:00.000Z',
      by: 'Auditor 1',
      logsRead: 20,
      fieldsCompared: 312,
      differences,
      reason: null,
      engine: { stored: '1.0.0', now: '1.1.0' },
      method: 'welch-mounts/1',
    });
    await fixture.whenStable();
  };

  const open = async (signed: VerdictRow[], ...roles: Role[]): Promise<void> => {
    configure(...roles);
    fixture = TestBed.createComponent(AuditPage);
    await fixture.whenStable();
    for (const request of http.match((candidate) => candidate.url === '/api/verdicts')) {
      const items = request.request.params.get('state') === 'signed off' ? signed : [];
      request.flush({ items, page: 1, pageSize: 200, total: items.length });
    }
    await fixture.whenStable();
  };

  it('re-runs all one after the other and says what each came to', async () => {
    await open([named(21, 'Shroud'), named(22, 'Fin pitch')], 'auditor');
    await press('Re-run all 2');
    http.expectNone(`/api/verdicts/${id(22)}/re-run`);
    await answer(21, 'identical');
    expect(text(page().querySelector('h1'))).toBe('Re-running 2 verdicts: 1 done, 1 identical');
    expect(page().querySelector('[role=progressbar]')?.getAttribute('aria-valuenow')).toBe('1');
    await answer(22, 'differs', [
      { path: 'judgement.pairs[0].marginOfError', stored: '0.6027', reRun: '0.62' },
    ]);
    expect(rows()[0]).toContain('Identical: every field, to the last digit');
    expect(rows()[1]).toContain('Differs: margin of error 0.60 → 0.62 °C; verdict unchanged');
    expect(text(page().querySelector('h1'))).toBe('Re-ran 2 verdicts: 1 identical');
  });

  it('stops after the one under way', async () => {
    await open([named(21, 'Shroud'), named(22, 'Fin pitch')], 'auditor');
    await press('Re-run all 2');
    await press('Stop after this one');
    await answer(21, 'identical');
    http.expectNone(`/api/verdicts/${id(22)}/re-run`);
    expect(text(page().querySelector('h1'))).toBe('Stopped after 1 of 2 verdicts: 1 identical');
  });

  it('opens stored and re-run side by side under a verdict that differs', async () => {
    await open([named(21, 'Shroud')], 'auditor');
    await press('Re-run Shroud');
    await answer(21, 'differs', [
      { path: 'judgement.pairs[0].marginOfError', stored: '0.6027', reRun: '0.64' },
    ]);
    await press('Compare Shroud');
    const compared = page().querySelector('tm-compare')!;
    const cells = [...compared.querySelectorAll('.changed')].map((row) => text(row));
    expect(cells).toEqual(['margin of error, °C±0.60±0.64changed']);
    expect(compared.querySelectorAll('tm-small-gap-rule')).toHaveLength(2);
    expect(text(compared)).toContain('judgement.pairs[0].marginOfError');
  });

  it('shows only the results chosen, and re-runs only those', async () => {
    const lastReRun = { at: '2026-03-10T10:00:00.000Z', by: 'Auditor 1', result: 'differs' } as const;
    await open([named(21, 'Shroud'), named(22, 'Fin pitch', { lastReRun })], 'auditor');
    const select = page().querySelector('select')!;
    select.value = 'differs';
    select.dispatchEvent(new Event('change'));
    await fixture.whenStable();
    expect(rows()).toHaveLength(1);
    await press('Re-run this verdict');
    http.expectNone(`/api/verdicts/${id(21)}/re-run`);
    await answer(22, 'identical');
  });

  it('lets an administrator read, not re-run', async () => {
    await open([named(21, 'Shroud')], 'administrator');
    expect(rows()).toHaveLength(1);
    expect([...page().querySelectorAll('button')].map((button) => text(button))).toEqual([
      'Export this table',
    ]);
  });

  it('fetches every page of the list', async () => {
    configure('auditor');
    fixture = TestBed.createComponent(AuditPage);
    await fixture.whenStable();
    const flush = async (state: string, wanted: string, items: VerdictRow[]): Promise<void> => {
      http
        .expectOne(({ params }) => params.get('state') === state && params.get('page') === wanted)
        .flush({ items, page: Number(wanted), pageSize: 1, total: state === 'submitted' ? 0 : 2 });
      await fixture.whenStable();
    };
    await flush('submitted', '1', []);
    await flush('signed off', '1', [named(21, 'Shroud')]);
    await flush('signed off', '2', [named(22, 'Fin pitch')]);
    expect(rows()).toHaveLength(2);
  });
});

describe('LedgerPage', () => {
  let fixture: ComponentFixture<LedgerPage>;
  const page = (): HTMLElement => fixture.nativeElement as HTMLElement;
  const digest = 'ab'.repeat(32);
  const entry = (number: number): LedgerEntry => ({
    id: id(900 + number),
    number,
    at: '2026-03-12T09:41:00.000Z',
    by: 'Lead 1',
    role: 'lead',
    action: 'signed off',
    subject: { kind: 'verdict', id: id(1), name: 'Fin coating' },
    content: { comment: 'Sound.' },
    previous: digest,
    digest,
  });

  const open = async (check: object): Promise<void> => {
    configure('auditor');
    fixture = TestBed.createComponent(LedgerPage);
    await fixture.whenStable();
    const items = [entry(3), entry(2), entry(1)];
    http.expectOne(({ url }) => url === '/api/ledger').flush({ items, page: 1, pageSize: 50, total: 120 });
    http.expectOne('/api/ledger/check').flush({
      entries: 3,
      whole: true,
      brokenAt: null,
      latestDigest: digest,
      checkedAt: '2026-03-12T10:00:00.000Z',
      ...check,
    });
    await fixture.whenStable();
  };

  it('says that the chain is whole and gives the latest digest to keep', async () => {
    await open({});
    expect(text(page().querySelector('h1'))).toBe('The ledger is whole: 3 entries');
    expect(text(page().querySelector('code'))).toBe(digest);
    expect(text(page().querySelector('.pages'))).toContain('Page 1 of 3');
  });

  it('says at which entry the chain breaks, there too', async () => {
    await open({ whole: false, brokenAt: 2 });
    expect(text(page().querySelector('h1'))).toBe('The ledger is broken at entry 2');
    const faulty = [...page().querySelectorAll('tbody tr')].filter((row) =>
      text(row).includes('broken here'),
    );
    expect(faulty.map((row) => text(row.querySelector('th')))).toEqual(['2 broken here']);
  });

  it('shows what was written in an entry and leads to its subject', async () => {
    await open({});
    expect(page().querySelector('tbody a')?.getAttribute('href')).toBe(`/verdicts/${id(1)}`);
    expect(text(page().querySelector('pre'))).toBe('{ "comment": "Sound." }');
  });
});
