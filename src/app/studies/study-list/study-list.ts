import {
  ChangeDetectionStrategy,
  Component,
  computed,
  effect,
  ElementRef,
  inject,
  input,
  signal,
  viewChild,
} from '@angular/core';
import { toObservable, toSignal } from '@angular/core/rxjs-interop';
import { RouterLink } from '@angular/router';
import { debounceTime, distinctUntilChanged } from 'rxjs';
import { Session } from '../../core/session';
import { GapScaleHead } from '../../ui/gap-rule';
import { load } from '../../ui/loading/load';
import { WaitingFor } from '../../ui/loading/waiting-for';
import { MomentPipe } from '../../ui/moment/moment-pipe';
import { StudiesClient } from '../studies-client';
import { domainsOf } from '../verdict-line/domains';
import { VerdictLine } from '../verdict-line/verdict-line';

/** Every study of the team, found by name, cooler or bench, with its newest verdicts on one scale. */
@Component({
  selector: 'tm-study-list',
  changeDetection: ChangeDetectionStrategy.OnPush,
  imports: [RouterLink, VerdictLine, WaitingFor, GapScaleHead, MomentPipe],
  templateUrl: './study-list.html',
  styleUrl: './study-list.scss',
})
export class StudyList {
  private readonly client = inject(StudiesClient);
  protected readonly session = inject(Session);
  private readonly searchField = viewChild<ElementRef<HTMLInputElement>>('search');
  /** Set by the search key: the field takes the focus. */
  readonly find = input<string>();

  protected readonly typed = signal('');
  private readonly search = toSignal(
    toObservable(this.typed).pipe(debounceTime(250), distinctUntilChanged()),
    {
      initialValue: '',
    },
  );
  protected readonly sort = signal<'newest' | 'name'>('newest');
  protected readonly page = signal(1);
  protected readonly studies = load(() =>
    this.client.page({ search: this.search(), sort: this.sort(), page: this.page() }),
  );
  protected readonly items = computed(() => this.studies.value()?.items ?? []);
  protected readonly domains = computed(() => domainsOf(this.items().flatMap(({ verdicts }) => verdicts)));
  protected readonly hasVerdicts = computed(() => this.items().some(({ verdicts }) => verdicts.length > 0));
  protected readonly pages = computed(() => {
    const answer = this.studies.value();
    return answer ? Math.max(1, Math.ceil(answer.total / answer.pageSize)) : 1;
  });
  protected readonly headline = computed(() => {
    const total = this.studies.value()?.total ?? 0;
    const found = this.search() ? ' found' : '';
    return total === 1 ? `1 study${found}` : `${total === 0 ? 'No' : total} studies${found}`;
  });

  constructor() {
    effect(() => {
      if (this.find()) this.searchField()?.nativeElement.focus();
    });
  }

  protected searchFor(text: string): void {
    this.typed.set(text);
    this.page.set(1);
  }

  protected sortBy(value: string): void {
    this.sort.set(value === 'name' ? 'name' : 'newest');
    this.page.set(1);
  }
}
