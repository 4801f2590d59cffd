import { ChangeDetectionStrategy, Component } from '@angular/core';
import { RouterLink } from '@angular/router';

@Component({
  selector: 'tm-not-found',
  changeDetection: ChangeDetectionStrategy.OnPush,
  imports: [RouterLink],
  template: `
    <div class="wrap">
      <div class="page-head">
        <div>
          <h1>Nothing stands at this address</h1>
          <p>The link may be old, or belong to another team.</p>
        </div>
      </div>
      <a class="button" routerLink="/">Go to Waiting</a>
    </div>
  `,
})
export class NotFound {}
