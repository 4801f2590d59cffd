import { ChangeDetectionStrategy, Component, computed, inject, input, signal } from '@angular/core';
import { Title } from '@angular/platform-browser';
import { Router, RouterLink } from '@angular/router';
import { map, tap } from 'rxjs';
import { Metric } from '../../../../shared/contracts/common';
import { Condition, Run } from '../../../../shared/contracts/studies';
import { ApiProblem } from '../../core/api-problem';
import { Session } from '../../core/session';
import { GapRule, GapScaleHead } from '../../ui/gap-rule';
import { load } from '../../ui/loading/load';
import { WaitingFor } from '../../ui/loading/waiting-for';
import { StudiesClient } from '../studies-client';
import { domainsOf } from '../verdict-line/domains';
import { VerdictLine } from '../verdict-line/verdict-line';
import { RunTable } from './run-table';

/** One study: its question, each condition with its verdicts, and every run it rests on. */
@Component({
  selector: 'tm-study',
  changeDetection: ChangeDetectionStrategy.OnPush,
  imports: [RouterLink, VerdictLine, WaitingFor, GapRule, GapScaleHead, RunTable],
  templateUrl: './study.html',
  styleUrl: './study.scss',
})
export class StudyPage {
  private readonly client = inject(StudiesClient);
  private readonly router = inject(Router);
  private readonly title = inject(Title);
  protected readonly session = inject(Session);

  readonly id = input.required<string>();

  protected readonly study = load(() =>
    this.client.study(this.id()).pipe(tap(({ name }) => this.title.setTitle(`${name} · Tenthmark`))),
  );
  protected readonly runs = load(() => this.client.runs(this.id()).pipe(map(({ runs }) => runs)));
  protected readonly thresholds = load(() => this.client.thresholds());
  protected readonly mayEdit = computed(() => this.session.has('analyst'));
  protected readonly domains = computed(() => domainsOf(this.study.value()?.verdicts ?? []));
  protected readonly judging = signal<string | null>(null);
  protected readonly problem = signal<string | null>(null);

  /** Each condition with the runs that count in it and its verdicts, newest first. */
  protected readonly conditions = computed(() => {
    const study = this.study.value();
    return (study?.conditions ?? []).map((condition) => {
      const runs = (this.runs.value() ?? []).filter(({ conditionId }) => conditionId === condition.id);
      const counted = runs.filter(({ leftOut }) => leftOut === null);
      const without = (study?.coolers ?? []).filter(
        ({ id }) => !counted.some(({ coolerId }) => coolerId === id),
      );
      return {
        condition,
        runs,
        verdicts: (study?.verdicts ?? []).filter((verdict) => verdict.condition.id === condition.id),
        missing:
          without.length > 0 ? `No run yet of ${without.map(({ name }) => name).join(' and ')}.` : null,
        hasWatts: counted.every(({ summary }) => summary.resistance !== null),
      };
    });
  });
  protected readonly pairWords = computed(() => {
    const coolers = this.study.value()?.coolers ?? [];
    const compared = coolers.filter(({ reference }) => !reference).map(({ name }) => name);
    const reference = coolers.find(({ reference: isReference }) => isReference)?.name ?? '';
    return `${compared.join(', ')} against ${reference}`;
  });
  protected readonly empty = computed(
    () => this.study.value()?.runs === 0 && this.runs.value()?.length === 0,
  );

  protected judge(condition: Condition, metric: Metric): void {
    if (this.judging()) return;
    this.judging.set(condition.id);
    this.problem.set(null);
    this.client.judge(this.id(), { conditionId: condition.id, metric }).subscribe({
      next: (verdict) => void this.router.navigate(['/verdicts', verdict.id]),
      error: (error: unknown) => {
        this.judging.set(null);
        this.problem.set(ApiProblem.from(error).words);
      },
    });
  }

  protected runsChanged(runs: readonly Run[]): void {
    this.runs.put([...runs]);
    this.study.reload();
  }
}
