import { Injectable, inject } from '@angular/core';
import type {
  CheckCodeRequest,
  FamilySession,
  LinkDescription,
  OpenLinkRequest,
  SendCodeRequest,
} from '../../../../shared/contracts/family-session';
import { FamilyHttp } from './family-http';

@Injectable({ providedIn: 'root' })
export class FamilySessionClient {
  private readonly http = inject(FamilyHttp);

  /** Asking does not use the link up. */
  describeLink(token: string): Promise<LinkDescription> {
    return this.http.post('links/describe', { token });
  }

  openLink(request: OpenLinkRequest): Promise<FamilySession> {
    return this.http.post('links/open', request);
  }

  current(): Promise<FamilySession> {
    return this.http.get('session');
  }

  sendCode(request: SendCodeRequest): Promise<unknown> {
    return this.http.post('codes', request);
  }

  checkCode(request: CheckCodeRequest): Promise<FamilySession> {
    return this.http.post('codes/check', request);
  }

  /** Back from 'fresh' to 'household': the letters are closed, the instructions stay open. */
  closeLetters(): Promise<unknown> {
    return this.http.post('session/close-letters');
  }

  signOut(): Promise<unknown> {
    return this.http.post('session/sign-out');
  }

  forgetPhone(): Promise<unknown> {
    return this.http.post('session/forget');
  }
}
