import { Injectable, inject } from '@angular/core';
import * as z from 'zod';
import {
  addStaffAnswer,
  type AddStaffAnswer,
  type AddStaffRequest,
  clinicSession,
  type ClinicSession,
  type SignInRequest,
  staffList,
  type StaffList,
} from '../../../../shared/contracts/clinic-session';
import { ClinicHttp, clinicFailure } from './clinic-http';

@Injectable({ providedIn: 'root' })
export class ClinicSessionClient {
  private readonly http = inject(ClinicHttp);

  /** null when nobody is signed in. */
  async current(): Promise<ClinicSession | null> {
    try {
      return await this.http.get('/session', clinicSession);
    } catch (error) {
      const failure = clinicFailure(error);
      if (failure.status === 401) return null;
      throw failure;
    }
  }

  signIn(request: SignInRequest): Promise<ClinicSession> {
    return this.http.post('/session', request, clinicSession);
  }

  signOut(): Promise<void> {
    return this.http.delete('/session');
  }

  async acceptInvitation(token: string, password: string): Promise<void> {
    await this.http.post('/staff-invitations/accept', { token, password }, z.unknown());
  }

  people(): Promise<StaffList> {
    return this.http.get('/people', staffList);
  }

  addStaff(request: AddStaffRequest): Promise<AddStaffAnswer> {
    return this.http.post('/people', request, addStaffAnswer);
  }
}
