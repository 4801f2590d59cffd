import { Dialog } from '@angular/cdk/dialog';
import { LiveAnnouncer } from '@angular/cdk/a11y';
import { HttpErrorResponse } from '@angular/common/http';
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
  signal,
  viewChild,
} from '@angular/core';
import { takeUntilDestroyed, toObservable, toSignal } from '@angular/core/rxjs-interop';
import { Title } from '@angular/platform-browser';
import { ActivatedRoute, RouterLink } from '@angular/router';
import {
  catchError,
  combineLatest,
  distinctUntilChanged,
  EMPTY,
  filter,
  map,
  merge,
  Observable,
  of,
  startWith,
  Subject,
  switchMap,
  takeWhile,
  timer,
} from 'rxjs';
import { ReRun, Verdict } from '../../../shared/contracts';
import { countsInWords as findingCounts } from '../ui/findings/consequence';
import { Findings } from '../ui/findings/findings';
import { GapRule, GapRulePair } from '../ui/gap-rule';
import { AskDialog } from './ask-dialog';
import { EveryRun } from './every-run';
import { LifeSteps } from './life-steps';
import { mediaMatches } from './media-matches';
import { Numbers } from './numbers';
import { PairTable } from './pair-table';
import { problemText } from './problem-text';
import { Provenance } from './provenance';
import { questionFor } from './questions';
import { Quote } from './quote';
import { ReRunResult, reRunInWords } from './re-run-result';
import { ScopeNotes } from './scope-notes';
import { Act, SignOffStrip } from './sign-off-strip';
import { StudyLine } from './study-line';
import { VerdictsClient } from './verdicts-client';
import { WhatWouldChange } from './what-would-change';

/**
 * loading: nothing is shown for 400 ms, then the unmarked rule with the seconds waited;
 * missing: 404, the verdict is not there or belongs to another team;
 * failed: anything else, with a way to try again.
 */
type View =
  | { readonly state: 'loading'; readonly seconds: number }
  | { readonly state: 'missing' }
  | { readonly state: 'failed'; readonly text: string }
  | { readonly state: 'ready'; readonly verdict: Verdict };

const PATIENCE = 400;

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
    WhatWouldChange,
  ],
  templateUrl: './verdict-page.html',
  styleUrl: './verdict-page.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class VerdictPage {
  private readonly route = inject(ActivatedRoute);
  private readonly client = inject(VerdictsClient);
  private readonly dialog = inject(Dialog);
  private readonly announcer = inject(LiveAnnouncer);
  private readonly injector = inject(Injector);
  private readonly title = inject(Title);
  private readonly again = new Subject<void>();
  private readonly strip = viewChild<SignOffStrip, ElementRef<HTMLElement>>('strip', { read: ElementRef });

  protected readonly view = signal<View>({ state: 'loading', seconds: 0 });
  protected readonly twoColumns = mediaMatches('(min-width: 1100px)');
  protected readonly reRunning = signal(false);
  protected readonly reRunDone = signal<ReRun | null>(null);
  protected readonly reRunProblem = signal<string | null>(null);

  protected readonly verdict = computed(() => {
    const view = this.view();
    return view.state === 'ready' ? view.verdict : null;
  });
  private readonly pairAsked = toSignal(
    this.route.queryParamMap.pipe(map((query) => Number(query.get('pair')))),
    {
      initialValue: 0,
    },
  );
  /** The pair shown: the one asked for, else the first against the reference. */
  protected readonly pairIndex = computed(() => {
    const pairs = this.verdict()?.judgement.pairs ?? [];
    const asked = this.pairAsked() - 1;
    if (asked in pairs) return asked;
    const reference = this.verdict()?.judgement.coolers.at(-1)?.name;
    return Math.max(
      0,
      pairs.findIndex(({ b }) => b === reference),
    );
  });
  protected readonly pair = computed(() => this.verdict()?.judgement.pairs[this.pairIndex()] ?? null);
  protected readonly words = computed(() => this.verdict()?.judgement.words[this.pairIndex()] ?? null);
  protected readonly headline = computed(() => {
    const words = this.words();
    return words === null ? '' : [words.headline, words.ratio].filter((part) => part !== null).join(': ');
  });
  protected readonly headlines = computed(
    () => this.verdict()?.judgement.words.map(({ headline }) => headline) ?? [],
  );
  protected readonly coolers = computed(
    () => this.verdict()?.judgement.coolers.map(({ name }) => name) ?? [],
  );
  protected readonly findingCounts = computed(() => findingCounts(this.verdict()?.judgement.findings ?? []));
  protected readonly rulePair = computed<GapRulePair | null>(() => {
    const [verdict, pair] = [this.verdict(), this.pair()];
    return verdict && pair && { ...pair, unit: verdict.unit, notJudgedCode: pair.notJudged?.code ?? null };
  });
  protected readonly sentBackWith = computed(() => {
    const verdict = this.verdict();
    if (verdict?.state !== 'sent back' && verdict?.state !== 'withdrawn') return null;
    return [...verdict.steps].reverse().find(({ action }) => action === verdict.state) ?? null;
  });

  private readonly studyId = computed(() => this.verdict()?.study.id ?? null);
  /** Other verdicts of the study, for the other quantity and for what replaces a withdrawn one. */
  private readonly siblings = toSignal(
    toObservable(this.studyId).pipe(
      filter((id) => id !== null),
      switchMap((studyId) => this.client.list({ studyId, pageSize: 200 }).pipe(catchError(() => EMPTY))),
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
    const id = this.route.paramMap.pipe(
      map((params) => params.get('id') ?? ''),
      distinctUntilChanged(),
    );
    combineLatest([id, this.again.pipe(startWith(undefined))])
      .pipe(
        switchMap(([verdictId]) => this.fetch(verdictId)),
        takeUntilDestroyed(),
      )
      .subscribe((view) => this.view.set(view));
    effect(() => {
      const verdict = this.verdict();
      if (verdict) this.title.setTitle(`${this.headline()}, ${verdict.study.name} | Tenthmark`);
    });
  }

  protected tryAgain(): void {
    this.again.next();
  }

  protected act(act: Act): void {
    const verdict = this.verdict();
    const words = this.words();
    if (verdict === null || words === null) return;
    if (act === 'reRun') {
      this.reRun();
      return;
    }
    const replacements = this.siblings().filter(
      ({ id, state }) => id !== verdict.id && state !== 'withdrawn',
    );
    const { question, done } = questionFor(act, verdict, this.headline(), replacements, this.client);
    this.dialog
      .open<Verdict>(AskDialog, { data: question, ariaLabelledBy: 'ask-title' })
      .closed.subscribe((changed) => {
        if (!changed) return;
        this.view.set({ state: 'ready', verdict: changed });
        void this.announcer.announce(done);
        afterNextRender(() => this.strip()?.nativeElement.querySelector<HTMLElement>('section')?.focus(), {
          injector: this.injector,
        });
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
          this.reRunning.set(false);
          this.reRunDone.set(done);
          this.view.set({ state: 'ready', verdict: changed });
          const { head, rest } = reRunInWords(done);
          void this.announcer.announce(`Re-run done. ${head}: ${rest}.`);
        },
        error: (error: unknown) => {
          this.reRunning.set(false);
          this.reRunProblem.set(problemText(error));
        },
      });
  }

  private fetch(id: string): Observable<View> {
    this.reRunDone.set(null);
    const answer = this.client.get(id).pipe(
      map((verdict): View => ({ state: 'ready', verdict })),
      catchError((error: unknown) =>
        of<View>(
          error instanceof HttpErrorResponse && error.status === 404
            ? { state: 'missing' }
            : { state: 'failed', text: problemText(error) },
        ),
      ),
    );
    const waiting = timer(PATIENCE, 1000).pipe(
      map((seconds): View => ({ state: 'loading', seconds: seconds + 1 })),
    );
    return merge(waiting, answer).pipe(takeWhile(({ state }) => state === 'loading', true));
  }
}
