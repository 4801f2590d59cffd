import { ChangeDetectionStrategy, Component, computed, inject, signal } from '@angular/core';
import { FormControl, FormGroup, ReactiveFormsModule } from '@angular/forms';
import { Router, RouterLink } from '@angular/router';
import { map } from 'rxjs';
import { addBenchRequestSchema } from '../../../shared/contracts/benches';
import { ApiProblem } from '../core/api-problem';
import { Session } from '../core/session';
import { contractErrors, fieldError } from '../ui/field-error/contract-errors';
import { FieldError } from '../ui/field-error/field-error';
import { load } from '../ui/loading/load';
import { WaitingFor } from '../ui/loading/waiting-for';
import { BenchClient } from './bench-client';

const words = () => new FormControl('', { nonNullable: true });

/** The team's benches. Noise belongs to a bench, so each has its own page. */
@Component({
  selector: 'tm-bench-list',
  changeDetection: ChangeDetectionStrategy.OnPush,
  imports: [ReactiveFormsModule, RouterLink, WaitingFor, FieldError],
  templateUrl: './bench-list.html',
  styleUrl: './bench-list.scss',
})
export class BenchList {
  private readonly client = inject(BenchClient);
  private readonly router = inject(Router);
  private readonly session = inject(Session);

  protected readonly benches = load(() => this.client.benches().pipe(map(({ benches }) => benches)));
  protected readonly headline = computed(() => {
    const count = this.benches.value()?.length;
    if (count === undefined) return 'Benches';
    return count === 1 ? '1 bench' : `${count === 0 ? 'No' : count} benches`;
  });
  protected readonly mayAdd = computed(() => this.session.has('administrator'));
  protected readonly adding = signal(false);
  protected readonly busy = signal(false);
  protected readonly problem = signal<string | null>(null);
  private readonly errors = signal<Readonly<Record<string, string>>>({});
  protected readonly form = new FormGroup({
    name: words(),
    place: words(),
    heatSource: words(),
    notes: words(),
  });

  protected error(field: string): string | null {
    return fieldError(this.errors(), field);
  }

  protected add(): void {
    if (this.busy()) return;
    const parsed = addBenchRequestSchema.safeParse(this.form.getRawValue());
    this.errors.set(contractErrors(parsed));
    if (!parsed.success) return;
    this.busy.set(true);
    this.client.add(parsed.data).subscribe({
      next: ({ id }) => void this.router.navigate(['/bench', id]),
      error: (error: unknown) => {
        this.busy.set(false);
        this.problem.set(ApiProblem.from(error).words);
      },
    });
  }
}
