import { Dialog } from '@angular/cdk/dialog';
import { NgTemplateOutlet } from '@angular/common';
import {
  afterNextRender,
  ChangeDetectionStrategy,
  Component,
  computed,
  effect,
  ElementRef,
  inject,
  Injector,
  input,
  linkedSignal,
  signal,
  viewChild,
} from '@angular/core';
import { toObservable, toSignal } from '@angular/core/rxjs-interop';
import { Title } from '@angular/platform-browser';
import { RouterLink } from '@angular/router';
import { catchError, EMPTY, filter, map, of, switchMap } from 'rxjs';
import { ReRun, Verdict } from '../../../shared/contracts/verdicts';
import { ApiProblem } from '../core/api-problem';
import { Session } from '../core/session';
import { WaitingCount } from '../core/waiting-count';
import { countsInWords } from '../ui/findings/consequence';
import { Findings } from '../ui/findings/findings';
import { GapRule, GapRulePair } from '../ui/gap-rule';
import { load } from '../ui/loading/load';
import { WaitingFor } from '../ui/loading/waiting-for';
import { NoticeBoard } from '../ui/notices/notice-board';
import { AskDialog } from './ask-dialog';
import { EveryRun } from './every-run';
import { LifeSteps } from './life-steps';
import { mediaMatches } from './media-matches';
import { Numbers } from './numbers';
import { PairTable } from './pair-table';
import { findingsByPair } from './pair-findings';
import { Provenance } from './provenance';
import { questionFor } from './questions';
import { Quote } from './quote';
import { reRunInWords, ReRunResult } from './re-run-result';
import { ScopeNotes } from './scope-notes';
import { Act, SignOffStrip } from './sign-off-strip';
import { StudyLine } from './study-line';
import { VerdictsClient } from './verdicts-client';
import { WhatWouldChange } from './what-would-change';

/** One verdict: words first, then the rule, then the numbers. */
@Component({
  selector: 'tm-verdict-page',
  imports: [
    EveryRun,
    Findings,
    GapRule,
    LifeSteps,
    NgTemplateOutlet,
    Numbers,
    PairTable,
    Provenance,
    Quote,
    ReRunResult,
    RouterLink,
    ScopeNotes,
    SignOffStrip,
    StudyLine,
    WaitingFor,
    WhatWouldChange,
  ],
  templateUrl: './verdict-page.html',
  styleUrl: './verdict-page.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class VerdictPage {
  protected readonly session = inject(Session);
  private readonly client = inject(VerdictsClient);
  private readonly dialog = inject(Dialog);
  private readonly notices = inject(NoticeBoard);
  private readonly waitingCount = inject(WaitingCount);
  private readonly injector = inject(Injector);
  private readonly title = inject(Title);
  private readonly strip = viewChild<SignOffStrip, ElementRef<HTMLElement>>('strip', { read: ElementRef });

  /** From the address. */
  readonly id = input.required<string>();
  /** Which of several pairs to show, counted from 1; from the address. */
  readonly pair = input<string>();

  protected readonly fetched = load(() => this.client.get(this.id()));
  protected readonly missing = computed(() => {
    const state = this.fetched.state();
    return state.state === 'failed' && state.problem.status === 404;
  });
  /** The verdict of this address; while another is on its way, none. */
  protected readonly verdict = computed(() => {
    const verdict = this.fetched.value();
    return verdict?.id === this.id() ? verdict : null;
  });
  protected readonly twoColumns = mediaMatches('(min-width: 1100px)');

  protected readonly reRunning = signal(false);
  protected readonly reRunDone = linkedSignal<string, ReRun | null>({
    source: this.id,
    computation: () => null,
  });
  protected readonly reRunProblem = linkedSignal<string, string | null>({
    source: this.id,
    computation: () => null,
  });

  /** The pair shown: the one asked for, else the first against the reference. */
  protected readonly pairIndex = computed(() => {
    const pairs = this.verdict()?.judgement.pairs ?? [];
    const asked = Number(this.pair()) - 1;
    if (asked in pairs) return asked;
    const reference = this.verdict()?.judgement.coolers.at(-1)?.name;
    return Math.max(
      0,
      pairs.findIndex(({ b }) => b === reference),
    );
  });
  protected readonly result = computed(() => this.verdict()?.judgement.pairs[this.pairIndex()] ?? null);
  protected readonly words = computed(() => this.verdict()?.judgement.words[this.pairIndex()] ?? null);
  protected readonly headline = computed(() =>
    [this.words()?.headline, this.words()?.ratio].filter((part) => part).join(': '),
  );
  protected readonly headlines = computed(
    () => this.verdict()?.judgement.words.map(({ headline }) => headline) ?? [],
  );
  protected readonly coolers = computed(
    () => this.verdict()?.judgement.coolers.map(({ name }) => name) ?? [],
  );
  protected readonly found = computed(() => {
    const judgement = this.verdict()?.judgement;
    return findingsByPair(judgement?.findings ?? [], judgement?.pairs ?? [], this.pairIndex());
  });
  protected readonly findingCounts = computed(() => countsInWords(this.found().here));
  protected readonly elsewhereCounts = computed(() => countsInWords(this.found().elsewhere));
  protected readonly rulePair = computed<GapRulePair | null>(() => {
    const [verdict, pair] = [this.verdict(), this.result()];
    return verdict && pair && { ...pair, unit: verdict.unit, notJudgedCode: pair.notJudged?.code ?? null };
  });
  /** Why it was sent back or withdrawn. */
  protected readonly objection = computed(() => {
    const verdict = this.verdict();
    if (verdict?.state !== 'sent back' && verdict?.state !== 'withdrawn') return null;
    return verdict.steps.filter(({ action }) => action === verdict.state).at(-1) ?? null;
  });

  /** Other verdicts of the study, for the other quantity and for what replaces a withdrawn one. */
  private readonly siblings = toSignal(
    toObservable(computed(() => this.verdict()?.study.id ?? null)).pipe(
      filter((studyId) => studyId !== null),
      // A convenience: without them the page only lacks two links.
      switchMap((studyId) => this.client.page({ studyId, pageSize: 200 }).pipe(catchError(() => EMPTY))),
      map(({ items }) => items),
    ),
    { initialValue: [] },
  );
  protected readonly otherMetric = computed(() => {
    const verdict = this.verdict();
    return (
      this.siblings().find(
        ({ condition, metric, state }) =>
          condition.id === verdict?.condition.id && metric !== verdict.metric && state !== 'withdrawn',
      ) ?? null
    );
  });

  constructor() {
    effect(() => {
      const verdict = this.verdict();
      if (verdict) this.title.setTitle(`${this.headline()}, ${verdict.study.name} · Tenthmark`);
    });
  }

  protected act(act: Act): void {
    const verdict = this.verdict();
    if (verdict === null) return;
    if (act === 'reRun') {
      this.reRun();
      return;
    }
    const others = this.siblings().filter(({ id, state }) => id !== verdict.id && state !== 'withdrawn');
    const { question, done } = questionFor(act, verdict, this.headline(), others, this.client);
    this.dialog
      .open<Verdict>(AskDialog, { data: question, ariaLabelledBy: 'ask-title' })
      .closed.subscribe((changed) => {
        if (!changed) return;
        this.fetched.put(changed);
        this.notices.done(done);
        this.waitingCount.refresh();
        afterNextRender(() => this.focusStrip(), { injector: this.injector });
      });
  }

  protected reRun(): void {
    const verdict = this.verdict();
    if (verdict === null || this.reRunning()) return;
    this.reRunning.set(true);
    this.reRunProblem.set(null);
    this.client
      .reRun(verdict.id)
      .pipe(
        switchMap((done) =>
          this.client.get(verdict.id).pipe(
            map((changed) => ({ done, changed })),
            catchError(() => of({ done, changed: verdict })),
          ),
        ),
      )
      .subscribe({
        next: ({ done, changed }) => {
          const { head, rest } = reRunInWords(done);
          this.reRunning.set(false);
          this.reRunDone.set(done);
          this.fetched.put(changed);
          this.notices.done(`Re-run done. ${head}: ${rest}.`);
        },
        error: (error: unknown) => {
          this.reRunning.set(false);
          this.reRunProblem.set(ApiProblem.from(error).words);
        },
      });
  }

  private focusStrip(): void {
    this.strip()?.nativeElement.querySelector<HTMLElement>('section')?.focus();
  }
}
