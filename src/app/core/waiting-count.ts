import { inject, Injectable, signal } from '@angular/core';
import { catchError, map, of } from 'rxjs';
import { waitingSchema } from '../../../shared/contracts/waiting';
import { Api } from './api';

/** How many things wait for the person here; the number beside Waiting in the bar. */
@Injectable({ providedIn: 'root' })
export class WaitingCount {
  private readonly api = inject(Api);
  readonly count = signal(0);

  refresh(): void {
    this.api
      .get('/waiting', waitingSchema)
      .pipe(
        map(({ roles }) => roles.reduce((sum, { count }) => sum + count, 0)),
        // The number is a convenience: a page that fails says so itself.
        catchError(() => of(this.count())),
      )
      .subscribe((count) => this.count.set(count));
  }
}
