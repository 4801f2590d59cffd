import { ChangeDetectionStrategy, Component, inject } from '@angular/core';
import { load } from '../ui/loading/load';
import { WaitingFor } from '../ui/loading/waiting-for';
import { MomentPipe } from '../ui/moment/moment-pipe';
import { PeopleClient } from './people-client';

/** Messages the server sent or, with no mail server set, would have sent. */
@Component({
  selector: 'tm-outbox',
  changeDetection: ChangeDetectionStrategy.OnPush,
  imports: [WaitingFor, MomentPipe],
  template: `
    <div class="wrap">
      <div class="page-head">
        <div>
          <h1>Outbox</h1>
          @if (outbox.value(); as box) {
            <p>
              {{
                box.mailServer
                  ? 'Messages go out through the mail server; those marked as not sent failed.'
                  : 'No mail server is set, so messages stay here. Hand the links on yourself.'
              }}
            </p>
          }
        </div>
      </div>
      @if (outbox.value(); as box) {
        <ul>
          @for (message of box.messages; track message.id) {
            <li>
              <h2>
                {{ message.subject }}
                <small
                  >to {{ message.to }}, {{ message.at | tmMoment }},
                  {{ message.sent ? 'sent' : 'not sent' }}</small
                >
              </h2>
              <pre>{{ message.text }}</pre>
            </li>
          } @empty {
            <li>No messages yet.</li>
          }
        </ul>
      } @else {
        <tm-waiting-for [load]="outbox.state()" what="Fetching the messages" (again)="outbox.reload()" />
      }
    </div>
  `,
  styles: `
    li {
      padding: 12px 0;
      border-top: 1px solid var(--hair);
    }
    h2 {
      font-size: 14px;
      font-weight: 600;
    }
    small {
      color: var(--ink-3);
      font-size: 12px;
      font-weight: 400;
    }
    pre {
      margin: 6px 0 0;
      color: var(--ink-2);
      font: inherit;
      overflow-wrap: anywhere;
      white-space: pre-wrap;
    }
  `,
})
export class OutboxPage {
  private readonly client = inject(PeopleClient);
  protected readonly outbox = load(() => this.client.outbox());
}
