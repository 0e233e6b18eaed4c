import { Injectable, inject } from '@angular/core';
import type {
  SayBackAnswered,
  SayBackAnswerRequest,
  SayItBack,
} from '../../../../shared/contracts/say-it-back';
import { FamilyHttp } from './family-http';

@Injectable({ providedIn: 'root' })
export class SayItBackClient {
  private readonly http = inject(FamilyHttp);

  questions(): Promise<SayItBack> {
    return this.http.get('say-it-back');
  }

  /** Safe to send twice: an answer that has come is explained again and not counted again. */
  answer(request: SayBackAnswerRequest): Promise<SayBackAnswered> {
    return this.http.post('say-it-back', request);
  }
}
