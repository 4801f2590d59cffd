import { inject, Injectable } from '@angular/core';
import { Observable } from 'rxjs';
import * as z from 'zod';
import {
  ChangePersonRequest,
  InvitePersonRequest,
  Outbox,
  outboxSchema,
  peopleSchema,
  Person,
  personSchema,
} from '../../../shared/contracts/accounts';
import { Api } from '../core/api';

/** The team's accounts, for its administrators. */
@Injectable({ providedIn: 'root' })
export class PeopleClient {
  private readonly api = inject(Api);

  people(): Observable<{ people: Person[] }> {
    return this.api.get('/people', peopleSchema);
  }

  invite(request: InvitePersonRequest): Observable<Person> {
    return this.api.post('/people', request, personSchema);
  }

  inviteAgain(id: string): Observable<unknown> {
    return this.api.post(`/people/${id}/invite`, {}, z.unknown());
  }

  change(id: string, request: ChangePersonRequest): Observable<Person> {
    return this.api.patch(`/people/${id}`, request, personSchema);
  }

  outbox(): Observable<Outbox> {
    return this.api.get('/outbox', outboxSchema);
  }
}
