import * as z from 'zod';
import { id, instant, shortText } from './common';

export const signInRequest = z.object({
  email: z.string().trim().toLowerCase().pipe(z.email('Give an e-mail address.')),
  password: z.string().min(1, 'Fill this in.').max(512),
});
export type SignInRequest = z.infer<typeof signInRequest>;

/** Who is signed in at the clinic. Rights are for hiding only; the server decides. */
export const clinicSession = z.object({
  staff: z.object({
    id,
    fullName: z.string(),
    credentials: z.string().nullable(),
    roles: z.array(z.string()),
    rights: z.array(z.string()),
  }),
  site: z.object({ id, name: z.string(), shortName: z.string(), zone: z.string() }),
  /** Business time of the server. */
  now: instant,
  endsAt: instant,
  hasRehearsal: z.boolean(),
});
export type ClinicSession = z.infer<typeof clinicSession>;

export const acceptStaffInvitationRequest = z.object({
  token: z.string().min(20).max(100),
  /** NIST SP 800-63B-4: 15 characters where the password is the only factor; no composition rules. */
  password: z.string().min(15, 'At least 15 characters. A short sentence works well.').max(512),
});
export type AcceptStaffInvitationRequest = z.infer<typeof acceptStaffInvitationRequest>;

export const staffMember = z.object({
  id,
  fullName: z.string(),
  credentials: z.string().nullable(),
  email: z.string(),
  roles: z.array(z.string()),
  isActive: z.boolean(),
  hasPassword: z.boolean(),
});
export const staffList = z.object({ staff: z.array(staffMember) });
export type StaffList = z.infer<typeof staffList>;

export const addStaffRequest = z.object({
  fullName: shortText(160),
  credentials: z.string().trim().max(60).nullable().default(null),
  email: z.string().trim().toLowerCase().pipe(z.email('Give an e-mail address.')),
  roles: z.array(z.string()).min(1, 'Choose at least one role.'),
});
export type AddStaffRequest = z.input<typeof addStaffRequest>;
/** The invitation also goes by e-mail; the link is shown once to the administrator who made it. */
export const addStaffAnswer = z.object({ staff: staffMember, invitationLink: z.string() });
export type AddStaffAnswer = z.infer<typeof addStaffAnswer>;

/** The roles somebody holds from now on, and no others. */
export const changeRolesRequest = addStaffRequest.pick({ roles: true });
export type ChangeRolesRequest = z.infer<typeof changeRolesRequest>;
