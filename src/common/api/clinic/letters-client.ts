import { Injectable, inject } from '@angular/core';
import {
  letterDesk,
  letterList,
  letterSigned,
  type LetterChoices,
  type LetterDesk,
  type LetterList,
  type LetterSigned,
  type SignLetterRequest,
} from '../../../../shared/contracts/letters';
import { ClinicHttp } from './clinic-http';

@Injectable({ providedIn: 'root' })
export class LettersClient {
  private readonly http = inject(ClinicHttp);

  list(): Promise<LetterList> {
    return this.http.get('/letters', letterList);
  }

  /** The letter that the results allow, with the choices made so far. */
  desk(seriesId: number, choices: LetterChoices): Promise<LetterDesk> {
    return this.http.post(`/series/${seriesId}/letter-desk`, choices, letterDesk);
  }

  sign(seriesId: number, request: SignLetterRequest): Promise<LetterSigned> {
    return this.http.post(`/series/${seriesId}/letters`, request, letterSigned);
  }

  release(letterId: number): Promise<LetterSigned> {
    return this.http.post(`/letters/${letterId}/release`, {}, letterSigned);
  }

  pdfAddress(letterId: number): string {
    return `/api/clinic/letters/${letterId}.pdf`;
  }
}
