import { ChangeDetectionStrategy, Component, computed, inject, signal } from '@angular/core';
import { takeUntilDestroyed, toSignal } from '@angular/core/rxjs-interop';
import { FormArray, FormControl, FormGroup, ReactiveFormsModule } from '@angular/forms';
import { Router, RouterLink } from '@angular/router';
import { addStudyRequestSchema } from '../../../../shared/contracts/studies';
import { ApiProblem } from '../../core/api-problem';
import { contractErrors, fieldError } from '../../ui/field-error/contract-errors';
import { FieldError } from '../../ui/field-error/field-error';
import { load } from '../../ui/loading/load';
import { WaitingFor } from '../../ui/loading/waiting-for';
import { StudiesClient } from '../studies-client';

const words = (value = '') => new FormControl(value, { nonNullable: true });
const condition = (name = '', watts: number | null = null) =>
  new FormGroup({ name: words(name), nominalWatts: new FormControl<number | null>(watts) });

/** Names the pair, the bench and the loads: all that must be settled before the first run. */
@Component({
  selector: 'tm-new-study',
  changeDetection: ChangeDetectionStrategy.OnPush,
  imports: [ReactiveFormsModule, RouterLink, FieldError, WaitingFor],
  templateUrl: './new-study.html',
  styleUrl: './new-study.scss',
})
export class NewStudy {
  private readonly client = inject(StudiesClient);
  private readonly router = inject(Router);

  protected readonly benches = load(() => this.client.benches());
  private readonly coolers = load(() => this.client.coolers());
  protected readonly knownCoolers = computed(() => this.coolers.value()?.coolers ?? []);
  protected readonly problem = signal<string | null>(null);
  protected readonly busy = signal(false);
  private readonly errors = signal<Readonly<Record<string, string>>>({});

  protected readonly form = new FormGroup({
    name: words(),
    question: words(),
    benchId: words(),
    compared: new FormArray([words()]),
    reference: words(),
    conditions: new FormArray([condition('Stock load')]),
  });

  /** The only bench needs no choosing. */
  private readonly changes = toSignal(this.form.valueChanges.pipe(takeUntilDestroyed()));
  protected readonly benchId = computed(() => {
    this.changes();
    return this.form.controls.benchId.value || (this.benches.value()?.benches[0]?.id ?? '');
  });

  protected error(field: string): string | null {
    return fieldError(this.errors(), field);
  }

  protected addCompared(): void {
    this.form.controls.compared.push(words());
  }

  protected addCondition(): void {
    this.form.controls.conditions.push(condition());
  }

  protected add(): void {
    if (this.busy()) return;
    const parsed = addStudyRequestSchema.safeParse({ ...this.form.getRawValue(), benchId: this.benchId() });
    this.errors.set(contractErrors(parsed));
    this.problem.set(null);
    if (!parsed.success) {
      this.problem.set('Some fields need a look; each says what.');
      return;
    }
    this.busy.set(true);
    this.client.add(parsed.data).subscribe({
      next: ({ id }) => void this.router.navigate(['/studies', id]),
      error: (error: unknown) => {
        this.busy.set(false);
        const problem = ApiProblem.from(error);
        this.problem.set(problem.words);
        this.errors.set(Object.fromEntries(problem.fields.map(({ path, message }) => [path, message])));
      },
    });
  }
}
