import { ChangeDetectionStrategy, Component, computed, inject, signal } from '@angular/core';
import { FormControl, FormGroup, ReactiveFormsModule } from '@angular/forms';
import { RouterLink } from '@angular/router';
import { map, Observable } from 'rxjs';
import { invitePersonRequestSchema, Person } from '../../../shared/contracts/accounts';
import { Role, roleSchema } from '../../../shared/contracts/common';
import { ApiProblem } from '../core/api-problem';
import { Session } from '../core/session';
import { contractErrors, fieldError } from '../ui/field-error/contract-errors';
import { FieldError } from '../ui/field-error/field-error';
import { load } from '../ui/loading/load';
import { WaitingFor } from '../ui/loading/waiting-for';
import { MomentPipe } from '../ui/moment/moment-pipe';
import { NoticeBoard } from '../ui/notices/notice-board';
import { PeopleClient } from './people-client';

const ROLE_WORDS: Record<Role, string> = {
  analyst: 'brings in runs, judges and submits',
  lead: 'sets thresholds, signs off or sends back',
  auditor: 'reads everything, re-runs verdicts',
  administrator: 'people, roles and benches',
};

const toggled = (roles: readonly Role[], role: Role): Role[] =>
  roles.includes(role) ? roles.filter((one) => one !== role) : [...roles, role];

/** Who is in the team, what each may do, and who is still to come. */
@Component({
  selector: 'tm-people',
  changeDetection: ChangeDetectionStrategy.OnPush,
  imports: [ReactiveFormsModule, RouterLink, WaitingFor, FieldError, MomentPipe],
  templateUrl: './people.html',
  styleUrl: './people.scss',
})
export class PeoplePage {
  private readonly client = inject(PeopleClient);
  private readonly notices = inject(NoticeBoard);
  protected readonly session = inject(Session);

  protected readonly roles = roleSchema.options;
  protected readonly roleWords = ROLE_WORDS;
  protected readonly people = load(() => this.client.people().pipe(map(({ people }) => people)));
  protected readonly headline = computed(() => {
    const people = this.people.value();
    if (!people) return 'People';
    const active = people.filter(({ state }) => state === 'active').length;
    const invited = people.filter(({ state }) => state === 'invited').length;
    const here = active === 1 ? '1 person works here' : `${active} people work here`;
    return invited ? `${here}, ${invited} invited` : here;
  });
  protected readonly inviting = signal(false);
  protected readonly busy = signal(false);
  protected readonly problem = signal<string | null>(null);
  private readonly errors = signal<Readonly<Record<string, string>>>({});
  protected readonly form = new FormGroup({
    name: new FormControl('', { nonNullable: true }),
    email: new FormControl('', { nonNullable: true }),
    roles: new FormControl<readonly Role[]>(['analyst'], { nonNullable: true }),
  });

  protected error(field: string): string | null {
    return fieldError(this.errors(), field);
  }

  protected toggleInvited(role: Role): void {
    this.form.controls.roles.setValue(toggled(this.form.controls.roles.value, role));
  }

  protected invite(): void {
    const parsed = invitePersonRequestSchema.safeParse(this.form.getRawValue());
    this.errors.set(contractErrors(parsed));
    if (!parsed.success) return;
    const words = `${parsed.data.name} is invited; the link is in the message.`;
    this.act(this.client.invite(parsed.data), words, () => {
      this.form.reset();
      this.inviting.set(false);
    });
  }

  protected inviteAgain(person: Person): void {
    this.act(this.client.inviteAgain(person.id), `A new invitation for ${person.name} is on its way.`);
  }

  protected toggleRole(person: Person, role: Role): void {
    const roles = toggled(person.roles, role);
    this.act(this.client.change(person.id, { roles }), `Roles of ${person.name} changed.`);
  }

  protected setStopped(person: Person, stopped: boolean): void {
    const words = stopped ? `${person.name} can no longer sign in.` : `${person.name} can sign in again.`;
    this.act(this.client.change(person.id, { stopped }), words);
  }

  private act(request: Observable<unknown>, words: string, then: () => void = () => undefined): void {
    if (this.busy()) return;
    this.busy.set(true);
    this.problem.set(null);
    request.subscribe({
      next: () => {
        this.busy.set(false);
        this.notices.done(words);
        then();
        this.people.reload();
      },
      error: (error: unknown) => {
        this.busy.set(false);
        this.problem.set(ApiProblem.from(error).words);
        // The boxes show what the server has, not what it refused.
        this.people.reload();
      },
    });
  }
}
