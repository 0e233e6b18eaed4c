import type { Request } from 'express';
import type { ClinicLanguage } from '../../shared/languages/clinic-languages';
import type { Actor } from '../access-record/record';
import { Problem } from '../http/problem';

/** Staff member of this request, put there by the clinic's session. */
export interface StaffMember {
  readonly id: number;
  readonly fullName: string;
  readonly roles: readonly string[];
  readonly siteId: number;
  /** In which the screen of this request speaks; not kept, another window may speak another one. */
  readonly language: ClinicLanguage;
}

/** Family member of this request, put there by the family's session. */
export interface FamilyVisitor {
  readonly familyMemberId: number;
  readonly householdId: number;
  readonly fullName: string;
  readonly language: string;
  /** 'household': instructions and the morning question; 'fresh': a code was entered lately, letters too. */
  readonly reach: 'household' | 'fresh';
}

declare module 'express-serve-static-core' {
  interface Request {
    /** Of requests to the clinic's side, signed in or not. */
    clinicLanguage?: ClinicLanguage;
    staffMember?: { readonly staff: StaffMember; readonly actor: Actor };
    familyVisitor?: { readonly visitor: FamilyVisitor; readonly actor: Actor };
  }
}

/** @throws Problem 401 when no staff member is signed in. */
export function staffMemberOf(req: Request): { staff: StaffMember; actor: Actor } {
  if (!req.staffMember) throw new Problem(401, 'not-signed-in', 'Sign in first.');
  return req.staffMember;
}

/** @throws Problem 401 when no family member is signed in. */
export function familyVisitorOf(req: Request): { visitor: FamilyVisitor; actor: Actor } {
  if (!req.familyVisitor)
    throw new Problem(401, 'not-signed-in', 'Open the link from the clinic again.');
  return req.familyVisitor;
}
