import { inject, Injectable } from '@angular/core';
import { Observable } from 'rxjs';
import {
  AddBenchRequest,
  Bench,
  benchesSchema,
  BenchNoise,
  benchNoiseSchema,
  benchSchema,
} from '../../../shared/contracts/benches';
import { Api } from '../core/api';

/** Benches and what each can tell apart. */
@Injectable({ providedIn: 'root' })
export class BenchClient {
  private readonly api = inject(Api);

  benches(): Observable<{ benches: Bench[] }> {
    return this.api.get('/benches', benchesSchema);
  }

  noise(id: string): Observable<BenchNoise> {
    return this.api.get(`/benches/${id}/noise`, benchNoiseSchema);
  }

  add(request: AddBenchRequest): Observable<Bench> {
    return this.api.post('/benches', request, benchSchema);
  }
}
