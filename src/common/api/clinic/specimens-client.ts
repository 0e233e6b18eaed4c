import { Injectable, inject } from '@angular/core';
import {
  resultList,
  specimen,
  specimenChanged,
  specimenList,
  type EnterResultRequest,
  type ResultList,
  type Specimen,
  type SpecimenChanged,
  type SpecimenList,
  type SpecimenStepRequest,
} from '../../../../shared/contracts/specimens';
import { ClinicHttp } from './clinic-http';

/** Specimens on their way, and their results. */
@Injectable({ providedIn: 'root' })
export class SpecimensClient {
  private readonly http = inject(ClinicHttp);

  list(): Promise<SpecimenList> {
    return this.http.get('/specimens', specimenList);
  }

  step(specimenId: number, request: SpecimenStepRequest): Promise<SpecimenChanged> {
    return this.http.post(`/specimens/${specimenId}/steps`, request, specimenChanged);
  }

  results(): Promise<ResultList> {
    return this.http.get('/results', resultList);
  }

  enterResult(specimenId: number, request: EnterResultRequest): Promise<Specimen> {
    return this.http.post(`/specimens/${specimenId}/results`, request, specimen);
  }

  lookAgain(resultId: number): Promise<Specimen> {
    return this.http.post(`/results/${resultId}/second-look`, {}, specimen);
  }
}
