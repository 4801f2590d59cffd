import { inject, Injectable } from '@angular/core';
import { Observable } from 'rxjs';
import { Bench, benchesSchema, Cooler, coolersSchema } from '../../../shared/contracts/benches';
import {
  AddStudyRequest,
  ChangeRunsRequest,
  JudgeRequest,
  runsSchema,
  Run,
  StudiesPage,
  studiesPageSchema,
  Study,
  studySchema,
} from '../../../shared/contracts/studies';
import { Verdict, verdictSchema } from '../../../shared/contracts/verdicts';
import { thresholdsHistorySchema, ThresholdsHistory } from '../../../shared/contracts/thresholds';
import { Api } from '../core/api';

/** Studies and their runs, as the server has them. */
@Injectable({ providedIn: 'root' })
export class StudiesClient {
  private readonly api = inject(Api);

  page(query: { search: string; sort: 'newest' | 'name'; page: number }): Observable<StudiesPage> {
    return this.api.get('/studies', studiesPageSchema, { ...query, pageSize: 20 });
  }

  study(id: string): Observable<Study> {
    return this.api.get(`/studies/${id}`, studySchema);
  }

  runs(studyId: string): Observable<{ runs: Run[] }> {
    return this.api.get(`/studies/${studyId}/runs`, runsSchema);
  }

  add(request: AddStudyRequest): Observable<Study> {
    return this.api.post('/studies', request, studySchema);
  }

  changeRuns(studyId: string, request: ChangeRunsRequest): Observable<{ runs: Run[] }> {
    return this.api.patch(`/studies/${studyId}/runs`, request, runsSchema);
  }

  judge(studyId: string, request: JudgeRequest): Observable<Verdict> {
    return this.api.post(`/studies/${studyId}/verdicts`, request, verdictSchema);
  }

  benches(): Observable<{ benches: Bench[] }> {
    return this.api.get('/benches', benchesSchema);
  }

  coolers(): Observable<{ coolers: Cooler[] }> {
    return this.api.get('/coolers', coolersSchema);
  }

  thresholds(): Observable<ThresholdsHistory> {
    return this.api.get('/thresholds', thresholdsHistorySchema);
  }
}
