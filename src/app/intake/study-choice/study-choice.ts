import { ChangeDetectionStrategy, Component, inject } from '@angular/core';
import { RouterLink } from '@angular/router';
import { StudiesClient } from '../../studies/studies-client';
import { load } from '../../ui/loading/load';
import { WaitingFor } from '../../ui/loading/waiting-for';

/** Logs belong to a study: which one are they for? */
@Component({
  selector: 'tm-study-choice',
  changeDetection: ChangeDetectionStrategy.OnPush,
  imports: [RouterLink, WaitingFor],
  template: `
    <div class="wrap">
      <div class="page-head">
        <div>
          <h1>Which study are the runs for?</h1>
          <p>Newest first. Logs are read after you choose.</p>
        </div>
        <div class="acts"><a class="button" routerLink="/studies/new">Start a study</a></div>
      </div>
      @if (studies.value(); as page) {
        <ul>
          @for (study of page.items; track study.id) {
            <li>
              <div>
                <h2>{{ study.name }}</h2>
                <p>{{ coolers(study.coolers) }}, on {{ study.bench.name }}, {{ study.runs }} runs so far</p>
              </div>
              <a
                class="button small"
                [routerLink]="['/intake', study.id]"
                [attr.aria-label]="'Bring in runs: ' + study.name"
                >Bring in runs</a
              >
            </li>
          } @empty {
            <li>No studies yet. Start one first.</li>
          }
        </ul>
      } @else {
        <tm-waiting-for [load]="studies.state()" what="Fetching the studies" (again)="studies.reload()" />
      }
    </div>
  `,
  styles: `
    ul {
      border-top: 1px solid var(--edge);
    }
    li {
      display: flex;
      flex-wrap: wrap;
      gap: 8px 24px;
      align-items: center;
      justify-content: space-between;
      padding: 10px 0;
      border-bottom: 1px solid var(--hair);
      color: var(--ink-2);
    }
    h2 {
      color: var(--ink);
      font-size: 14px;
      font-weight: 600;
    }
  `,
})
export class StudyChoice {
  private readonly client = inject(StudiesClient);
  protected readonly studies = load(() => this.client.page({ search: '', sort: 'newest', page: 1 }));

  protected coolers(coolers: readonly { readonly name: string }[]): string {
    return coolers.map(({ name }) => name).join(' against ');
  }
}
