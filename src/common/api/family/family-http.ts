import { HttpClient } from '@angular/common/http';
import { Injectable, inject } from '@angular/core';
import { firstValueFrom, throwError, timeout, type Observable } from 'rxjs';
import { familyFailure, FamilyFailure } from './family-failure';

const ORIGIN = '/api/family/';
/** Keeps the service worker out, so that no signal is seen as no signal and nothing personal is kept by it. */
const HEADERS = { 'ngsw-bypass': 'on' };
/** A bad signal can hold a request for minutes; the family then waits before a grey page. */
const WAIT_MS = 20_000;

/** The one way from the family's phone to the clinic. Rejects with FamilyFailure only. */
@Injectable({ providedIn: 'root' })
export class FamilyHttp {
  private readonly http = inject(HttpClient);

  get<T>(path: string): Promise<T> {
    return this.answer(this.http.get<T>(ORIGIN + path, { headers: HEADERS }));
  }

  post<T>(path: string, body: object = {}): Promise<T> {
    return this.answer(this.http.post<T>(ORIGIN + path, body, { headers: HEADERS }));
  }

  private async answer<T>(request: Observable<T>): Promise<T> {
    try {
      return await firstValueFrom(
        request.pipe(
          timeout({
            each: WAIT_MS,
            with: () => throwError(() => new FamilyFailure('unreached', null)),
          }),
        ),
      );
    } catch (error) {
      throw familyFailure(error);
    }
  }
}
