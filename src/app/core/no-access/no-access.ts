import { ChangeDetectionStrategy, Component, computed, inject, input } from '@angular/core';
import { RouterLink } from '@angular/router';
import { Session } from '../session';

/** A link led to a place that this person's role can't use: says who can. */
@Component({
  selector: 'tm-no-access',
  changeDetection: ChangeDetectionStrategy.OnPush,
  imports: [RouterLink],
  template: `
    <div class="wrap">
      <div class="page-head">
        <div>
          <h1>This place is for {{ who() }}</h1>
          <p>You are here as {{ mine() }}. An administrator of your team can change roles.</p>
        </div>
      </div>
      <a class="button" routerLink="/">Go to Waiting</a>
    </div>
  `,
})
export class NoAccess {
  private readonly session = inject(Session);
  /** Roles that can, separated by commas. */
  readonly for = input('');
  protected readonly who = computed(() => {
    const roles = this.for()
      .split(',')
      .filter((role) => role !== '')
      .map((role) => `${role}s`);
    return roles.length > 1 ? `${roles.slice(0, -1).join(', ')} and ${roles.at(-1)}` : (roles[0] ?? 'others');
  });
  protected readonly mine = computed(() => this.session.roles().join(', '));
}
