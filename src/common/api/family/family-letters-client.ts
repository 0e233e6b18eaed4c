import { Injectable, inject } from '@angular/core';
import type { FamilyLetter, FamilyLetterList } from '../../../../shared/contracts/family-letters';
import { FamilyHttp } from './family-http';

/** Letters need a code entered within the last minutes; they are never kept on the phone. */
@Injectable({ providedIn: 'root' })
export class FamilyLettersClient {
  private readonly http = inject(FamilyHttp);

  letters(): Promise<FamilyLetterList> {
    return this.http.get('letters');
  }

  /** Opening is recorded by the clinic. */
  letter(id: number): Promise<FamilyLetter> {
    return this.http.get(`letters/${id}`);
  }
}
