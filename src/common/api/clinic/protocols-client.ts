import { Injectable, inject } from '@angular/core';
import type { z } from 'zod';
import {
  consequences,
  profileCheck,
  profileDetail,
  protocolCheck,
  protocolDetail,
  versionList,
  type CheckProfileRequest,
  type CheckProtocolRequest,
  type Consequences,
  type ProfileCheck,
  type ProfileDetail,
  type ProfileValues,
  type ProtocolCheck,
  type ProtocolDetail,
  type ProtocolValues,
  type SignVersionRequest,
  type VersionList,
} from '../../../../shared/contracts/protocols';
import { done } from '../../../../shared/contracts/common';
import { ClinicHttp } from './clinic-http';

interface Draft {
  readonly id: number;
  readonly draftVersion: number;
}

/** The life of a version, the same for protocols and profiles. */
export abstract class VersionsClient<Detail> {
  protected readonly http = inject(ClinicHttp);

  protected abstract readonly path: string;
  protected abstract readonly detail: z.ZodType<Detail>;

  list(): Promise<VersionList> {
    return this.http.get(this.path, versionList);
  }

  open(id: number): Promise<Detail> {
    return this.http.get(`${this.path}/${id}`, this.detail);
  }

  /** A draft from the version in force. A repeat with the same key answers like the first. */
  draft(submissionKey: string): Promise<Detail> {
    return this.http.post(this.path, { submissionKey }, this.detail);
  }

  async discard({ id, draftVersion }: Draft): Promise<void> {
    await this.http.post(`${this.path}/${id}/discard`, { draftVersion }, done);
  }

  /** What signing would change. */
  consequences(id: number): Promise<Consequences> {
    return this.http.get(`${this.path}/${id}/consequences`, consequences);
  }

  sign(id: number, request: SignVersionRequest): Promise<Detail> {
    return this.http.post(`${this.path}/${id}/signature`, request, this.detail);
  }
}

@Injectable({ providedIn: 'root' })
export class ProtocolsClient extends VersionsClient<ProtocolDetail> {
  protected readonly path = '/fasting-protocols';
  protected readonly detail = protocolDetail;

  save({ id, draftVersion }: Draft, values: ProtocolValues): Promise<ProtocolDetail> {
    return this.http.put(`${this.path}/${id}`, { draftVersion, values }, this.detail);
  }

  /** Beside the editor; writes nothing. */
  check(request: CheckProtocolRequest): Promise<ProtocolCheck> {
    return this.http.post(`${this.path}/check`, request, protocolCheck);
  }
}

@Injectable({ providedIn: 'root' })
export class ProfilesClient extends VersionsClient<ProfileDetail> {
  protected readonly path = '/laboratory-profiles';
  protected readonly detail = profileDetail;

  save({ id, draftVersion }: Draft, values: ProfileValues): Promise<ProfileDetail> {
    return this.http.put(`${this.path}/${id}`, { draftVersion, values }, this.detail);
  }

  check(request: CheckProfileRequest): Promise<ProfileCheck> {
    return this.http.post(`${this.path}/check`, request, profileCheck);
  }
}
