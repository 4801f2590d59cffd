import { ChangeDetectionStrategy, Component, computed, input } from '@angular/core';
import { Finding } from '../../../../shared/contracts';
import { byConsequence, CONSEQUENCE } from './consequence';
import { FindingMark } from './finding-mark';

/** Every check with its consequence, worst first. */
@Component({
  selector: 'tm-findings',
  imports: [FindingMark],
  template: `
    <ul>
      @for (finding of sorted(); track $index) {
        <li>
          <tm-finding-mark [level]="finding.level" />
          <div class="head">
            <b>{{ finding.title }}</b>
            <span class="consequence" [class]="finding.level">{{ consequence[finding.level] }}</span>
          </div>
          <p>{{ finding.text }}</p>
        </li>
      } @empty {
        <li class="none">No checks ran on this verdict.</li>
      }
    </ul>
  `,
  styles: `
    :host {
      display: block;
    }
    ul {
      margin: 0;
      padding: 0;
      list-style: none;
    }
    li {
      display: grid;
      grid-template-columns: 20px 1fr;
      gap: 2px 10px;
      padding: 8px 0;
      border-top: 1px solid var(--hair);
      font-size: 13px;
      line-height: 18px;
      break-inside: avoid;
    }
    li:first-child {
      border-top-color: var(--edge);
    }
    tm-finding-mark {
      margin-top: 2px;
    }
    .head {
      display: flex;
      flex-wrap: wrap;
      justify-content: space-between;
      gap: 0 12px;
    }
    b {
      font-weight: 600;
    }
    .consequence {
      color: var(--ink-3);
      font-size: 12px;
      white-space: nowrap;
    }
    .caution,
    .stop {
      font-weight: 500;
    }
    .caution {
      color: var(--weak);
    }
    .stop {
      color: var(--stop);
    }
    p {
      grid-column: 2;
      margin: 0;
      color: var(--ink-2);
      overflow-wrap: anywhere;
    }
    .none {
      display: block;
      color: var(--ink-2);
    }
  `,
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class Findings {
  readonly findings = input.required<readonly Finding[]>();
  protected readonly sorted = computed(() => byConsequence(this.findings()));
  protected readonly consequence = CONSEQUENCE;
}
