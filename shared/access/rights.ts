/**
 * Who may do what: one table. The server checks it for every request; a screen only hides what
 * would be refused. A right says nothing about whose record it is: an outreach nurse's own
 * families and a guardian's own children are checked where the record is read.
 */

export const staffRoles = [
  'nurse-coordinator',
  'clinician',
  'lead-clinician',
  'front-desk',
  'language-reviewer',
  'outreach-nurse',
  'administrator',
] as const;
export type StaffRole = (typeof staffRoles)[number];

export const familyRoles = ['guardian', 'helper'] as const;
export type FamilyRole = (typeof familyRoles)[number];

export const roles = [...staffRoles, ...familyRoles] as const;
export type Role = (typeof roles)[number];

export const rights = [
  'children.read',
  'children.write',
  'contacts.read',
  'contacts.write',
  'orders.read',
  'orders.write',
  'orders.sign',
  'individual-plans.sign',
  'consents.read',
  'consents.write',
  'series.read',
  'series.plan',
  'series.close',
  'mornings.read',
  'mornings.run',
  'mornings.close',
  'arrivals.write',
  'door-check.write',
  'collections.write',
  'specimens.read',
  'specimens.write',
  'results.read',
  'results.write',
  'results.second-look',
  'letters.read',
  'letters.write',
  'letters.sign',
  'letters.release',
  'letters.tell',
  'calls.read',
  'calls.write',
  'messages.read',
  'alerts.take',
  'wording.read',
  'wording.write',
  'wording.sign-off',
  'protocols.read',
  'protocols.write',
  'protocols.sign',
  'set-up.read',
  'set-up.write',
  'people.read',
  'people.write',
  'access-record.read',
  'figures.read',
  'rehearsal.use',
  'family.instructions',
  'family.fasting-check',
  'family.contact',
  'family.letters',
] as const;
export type Right = (typeof rights)[number];

const careTeam: readonly Right[] = [
  'children.read',
  'children.write',
  'contacts.read',
  'contacts.write',
  'orders.read',
  'orders.write',
  'consents.read',
  'consents.write',
  'series.read',
  'series.plan',
  'mornings.read',
  'mornings.run',
  'mornings.close',
  'arrivals.write',
  'door-check.write',
  'collections.write',
  'specimens.read',
  'specimens.write',
  'results.read',
  'results.write',
  'results.second-look',
  'letters.read',
  'letters.write',
  'letters.tell',
  'calls.read',
  'calls.write',
  'messages.read',
  'alerts.take',
  'wording.read',
  'protocols.read',
  'protocols.write',
  'set-up.read',
  'people.read',
  'figures.read',
  'rehearsal.use',
];

const clinician: readonly Right[] = [
  ...careTeam,
  'orders.sign',
  'individual-plans.sign',
  'series.close',
  'letters.sign',
  'letters.release',
  'wording.sign-off',
  'protocols.sign',
];

const table: Readonly<Record<Role, readonly Right[]>> = {
  'nurse-coordinator': careTeam,
  clinician,
  'lead-clinician': [...clinician, 'access-record.read'],
  'front-desk': [
    'children.read',
    'contacts.read',
    'contacts.write',
    'mornings.read',
    'arrivals.write',
    'calls.read',
    'calls.write',
    'messages.read',
    'alerts.take',
    'rehearsal.use',
  ],
  'language-reviewer': ['wording.read', 'wording.write', 'wording.sign-off'],
  'outreach-nurse': [
    'children.read',
    'contacts.read',
    'contacts.write',
    'series.read',
    'mornings.read',
    'door-check.write',
    'letters.read',
    'letters.tell',
    'calls.read',
    'calls.write',
    'messages.read',
    'alerts.take',
    'wording.read',
  ],
  administrator: [
    'protocols.read',
    'set-up.read',
    'set-up.write',
    'people.read',
    'people.write',
    'alerts.take',
    'rehearsal.use',
  ],
  guardian: ['family.instructions', 'family.fasting-check', 'family.contact', 'family.letters'],
  helper: ['family.instructions', 'family.fasting-check'],
};

/** Whether any of the roles grants the right. */
export function can(held: readonly Role[], right: Right): boolean {
  return held.some((role) => table[role].includes(right));
}

/** Every right of the roles together, in the order of the list. */
export function rightsOf(held: readonly Role[]): Right[] {
  return rights.filter((right) => can(held, right));
}

export function isRole(text: string): text is Role {
  return (roles as readonly string[]).includes(text);
}

export function isStaffRole(text: string): text is StaffRole {
  return (staffRoles as readonly string[]).includes(text);
}
