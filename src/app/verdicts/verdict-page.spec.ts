import { provideHttpClient, withInterceptors } from '@angular/common/http';
import { HttpTestingController, provideHttpClientTesting } from '@angular/common/http/testing';
import { ComponentFixture, TestBed } from '@angular/core/testing';
import { provideRouter } from '@angular/router';
import { Verdict } from '../../../shared/contracts';
import { problemInterceptor } from '../core/problem-interceptor';
import { Session } from '../core/session';
import { NoticeBoard } from '../ui/notices/notice-board';
import { finRow, finVerdict, id } from './verdict-fixture';
import { VerdictPage } from './verdict-page';

// Whole pages in a simulated browser, on machines that do other work at the same time.
jest.setTimeout(30_000);

describe('VerdictPage', () => {
  let fixture: ComponentFixture<VerdictPage>;
  let http: HttpTestingController;
  const page = (): HTMLElement => fixture.nativeElement as HTMLElement;
  const text = (element: Element | null): string => (element?.textContent ?? '').replace(/\s+/g, ' ').trim();
  const dialog = (): HTMLElement => document.querySelector<HTMLElement>('tm-ask-dialog')!;
  const press = async (words: string, where: Element = page()): Promise<void> => {
    const found = [...where.querySelectorAll('button')].find((button) => text(button) === words);
    if (!found) throw new Error(`no button "${words}"`);
    found.click();
    await fixture.whenStable();
  };
  const type = async (words: string): Promise<void> => {
    const area = dialog().querySelector('textarea')!;
    area.value = words;
    area.dispatchEvent(new Event('input'));
    await fixture.whenStable();
  };

  const open = async (verdict: Verdict = finVerdict(), pair?: string): Promise<void> => {
    fixture = TestBed.createComponent(VerdictPage);
    fixture.componentRef.setInput('id', id(1));
    if (pair) fixture.componentRef.setInput('pair', pair);
    await fixture.whenStable();
    http.expectOne(`/api/verdicts/${id(1)}`).flush(verdict);
    await fixture.whenStable();
    const siblings = [finRow(), finRow({ id: id(11), metric: 'resistance', unit: 'K/W' })];
    http
      .match((request) => request.url === '/api/verdicts')
      .forEach((request) => request.flush({ items: siblings, page: 1, pageSize: 200, total: 2 }));
    await fixture.whenStable();
  };

  beforeEach(() => {
    TestBed.configureTestingModule({
      providers: [
        provideHttpClient(withInterceptors([problemInterceptor])),
        provideHttpClientTesting(),
        provideRouter([]),
        { provide: Session, useValue: { roles: () => ['lead'] } },
      ],
    });
    http = TestBed.inject(HttpTestingController);
  });

  it('says the verdict first, as the page’s one main heading, then the rule and the sentence', async () => {
    await open();
    expect([...page().querySelectorAll('h1')].map((h1) => text(h1))).toEqual([
      'Outside noise, only just: 1.04× the margin of error',
    ]);
    expect(text(page().querySelector('tm-study-line'))).toContain('10 runs, 5 mounts each');
    expect(text(page().querySelector('svg[role=img] title'))).toContain('Outside noise, only just');
    expect(text(page().querySelector('tm-quote'))).toContain('give or take 0.60 °C at 95% confidence');
  });

  it('links to the study and to the same runs judged by the other quantity', async () => {
    await open();
    const links = [...page().querySelectorAll('tm-study-line a')].map((link) => link.getAttribute('href'));
    expect(links).toContain(`/studies/${id(2)}`);
    expect(links).toContain(`/verdicts/${id(11)}`);
  });

  it('signs off after asking, with the headline and the number of weak findings said again', async () => {
    await open();
    await press('Sign off this verdict');
    expect(text(dialog())).toContain('Outside noise, only just: 1.04× the margin of error');
    expect(text(dialog())).toContain('2 findings weaken it.');
    await press('Sign off this verdict', dialog());
    const request = http.expectOne(`/api/verdicts/${id(1)}/sign-off`);
    expect(request.request.body).toEqual({ comment: null });
    request.flush(finVerdict({ state: 'signed off', stateSince: '2026-03-13T08:00:00.000Z' }));
    await fixture.whenStable();
    expect(text(page().querySelector('tm-study-line'))).toContain('Signed off');
    expect(
      TestBed.inject(NoticeBoard)
        .notices()
        .map((notice) => notice.text),
    ).toEqual(['Signed off.']);
  });

  it('asks for a reason before sending back, and keeps it when the server refuses', async () => {
    await open();
    await press('Send back with a note');
    await press('Send back with a note', dialog());
    http.expectNone(`/api/verdicts/${id(1)}/send-back`);
    expect(text(dialog())).toContain('Say why, in a few words.');

    await type('Add two mounts each.');
    await press('Send back with a note', dialog());
    http.expectOne(`/api/verdicts/${id(1)}/send-back`).flush(
      {
        type: 'about:blank',
        title: 'Too late.',
        status: 409,
        code: 'wrong-state',
        detail: 'It is signed off.',
      },
      { status: 409, statusText: 'Conflict' },
    );
    await fixture.whenStable();
    expect(text(dialog().querySelector('[role=alert]'))).toContain('It is signed off.');
    expect(dialog().querySelector('textarea')!.value).toBe('Add two mounts each.');
  });

  it('re-runs from the raw files and shows the result beside the provenance', async () => {
    await open();
    await press('Re-run');
    http.expectOne(`/api/verdicts/${id(1)}/re-run`).flush({
      verdictId: id(1),
      result: 'identical',
      at: '2026-03-12T10:02:00.000Z',
      by: 'Lead 1',
      logsRead: 20,
      fieldsCompared: 312,
      differences: [],
      reason: null,
      engine: { stored: '1.0.0', now: '1.0.0' },
      method: 'welch-mounts/1',
    });
    http
      .expectOne(`/api/verdicts/${id(1)}`)
      .flush(
        finVerdict({ lastReRun: { at: '2026-03-12T10:02:00.000Z', by: 'Lead 1', result: 'identical' } }),
      );
    await fixture.whenStable();
    expect(text(page().querySelector('tm-re-run-result'))).toContain(
      'Identical: every field, to the last digit',
    );
    expect(text(page().querySelector('tm-provenance'))).toContain('identical by Lead 1');
  });

  it('says under the study line why the verdict is stale, and why it was sent back', async () => {
    await open(
      finVerdict({
        state: 'sent back',
        stale: true,
        staleReasons: ['Made with thresholds set 6; set 7 is in force.'],
        steps: [
          {
            action: 'sent back',
            by: 'Lead 1',
            role: 'lead',
            at: '2026-03-12T12:00:00.000Z',
            comment: 'Add mounts.',
          },
        ],
      }),
    );
    const notices = [...page().querySelectorAll('.notice')].map((notice) => text(notice));
    expect(notices[0]).toContain('Made with thresholds set 6; set 7 is in force.');
    expect(notices[1]).toBe('Sent back by Lead 1. Add mounts.');
  });

  it('shows the pair asked for of several, and the first against the reference by itself', async () => {
    const verdict = finVerdict();
    const [pair] = verdict.judgement.pairs;
    const [words] = verdict.judgement.words;
    const three: Verdict = {
      ...verdict,
      judgement: {
        ...verdict.judgement,
        coolers: [{ ...verdict.judgement.coolers[0], name: 'T1' }, ...verdict.judgement.coolers],
        pairs: [{ ...pair, a: 'T1', b: 'Coated fins' }, { ...pair, a: 'T1' }, pair],
        words: ['T1 and coated', 'T1 and bare', 'coated and bare'].map((headline) => ({
          ...words,
          headline,
        })),
      },
    };
    await open(three);
    expect(text(page().querySelector('h1'))).toContain('T1 and bare');
    fixture.componentRef.setInput('pair', '1');
    await fixture.whenStable();
    expect(text(page().querySelector('h1'))).toContain('T1 and coated');
  });

  it('says that a verdict is not here, without a way to try the same again', async () => {
    fixture = TestBed.createComponent(VerdictPage);
    fixture.componentRef.setInput('id', id(1));
    await fixture.whenStable();
    http
      .expectOne(`/api/verdicts/${id(1)}`)
      .flush(
        { type: 'about:blank', title: 'There is no such verdict.', status: 404, code: 'not-found' },
        { status: 404, statusText: 'Not Found' },
      );
    await fixture.whenStable();
    expect(text(page().querySelector('h1'))).toBe('This verdict is not here');
    expect(page().querySelector('button')).toBeNull();
  });
});
