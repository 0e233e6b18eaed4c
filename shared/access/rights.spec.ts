import { can, isRole, isStaffRole, rights, rightsOf, roles, type Right, type Role } from './rights';

const clinical: readonly Right[] = [
  ...(['children.read', 'orders.read', 'results.read', 'letters.read', 'specimens.read'] as const),
];
const family: readonly Right[] = rights.filter((right) => right.startsWith('family.'));

describe('what each role may and may not do', () => {
  const cases: readonly (readonly [Role, readonly Right[], readonly Right[]])[] = [
    [
      'nurse-coordinator',
      [
        'children.write',
        'orders.write',
        'consents.write',
        'series.plan',
        'mornings.run',
        'door-check.write',
        'collections.write',
        'specimens.write',
        'results.write',
        'results.second-look',
        'letters.read',
        'calls.write',
        'figures.read',
      ],
      [
        'orders.sign',
        'letters.sign',
        'letters.release',
        'series.close',
        'protocols.sign',
        'set-up.write',
        'people.write',
        'access-record.read',
        'wording.sign-off',
        ...family,
      ],
    ],
    [
      'clinician',
      [
        'orders.sign',
        'letters.sign',
        'letters.release',
        'series.close',
        'protocols.sign',
        'results.read',
        'wording.sign-off',
        ...clinical,
      ],
      ['access-record.read', 'people.write', 'set-up.write', ...family],
    ],
    [
      'lead-clinician',
      ['access-record.read', 'orders.sign', 'letters.release', ...clinical],
      ['people.write', 'set-up.write', ...family],
    ],
    [
      'front-desk',
      ['mornings.read', 'arrivals.write', 'contacts.write', 'calls.read', 'calls.write'],
      [
        'results.read',
        'results.write',
        'letters.read',
        'letters.release',
        'letters.tell',
        'orders.read',
        'specimens.read',
        'door-check.write',
        'collections.write',
        'series.plan',
        'children.write',
        'figures.read',
        'access-record.read',
        ...family,
      ],
    ],
    [
      'language-reviewer',
      ['wording.read', 'wording.write', 'wording.sign-off'],
      rights.filter((right) => !right.startsWith('wording.')),
    ],
    [
      'outreach-nurse',
      ['children.read', 'door-check.write', 'letters.read', 'letters.tell', 'calls.write'],
      [
        'results.read',
        'results.write',
        'letters.sign',
        'letters.release',
        'orders.sign',
        'collections.write',
        'series.plan',
        'set-up.read',
        'people.read',
        ...family,
      ],
    ],
    [
      'administrator',
      ['people.write', 'set-up.write', 'protocols.read'],
      [
        'protocols.sign',
        'mornings.read',
        'contacts.read',
        'calls.read',
        'messages.read',
        'consents.read',
        'figures.read',
        'access-record.read',
        'wording.read',
        ...clinical,
        ...family,
      ],
    ],
    [
      'guardian',
      ['family.instructions', 'family.fasting-check', 'family.letters', 'family.contact'],
      rights.filter((right) => !right.startsWith('family.')),
    ],
    [
      'helper',
      ['family.instructions', 'family.fasting-check'],
      [
        'family.letters',
        'family.contact',
        ...rights.filter((right) => !right.startsWith('family.')),
      ],
    ],
  ];

  it.each(cases)('%s', (role, may, mayNot) => {
    expect(may.filter((right) => !can([role], right))).toEqual([]);
    expect(mayNot.filter((right) => can([role], right))).toEqual([]);
  });

  it('is tested for every role', () => {
    expect(cases.map(([role]) => role)).toEqual([...roles]);
  });
});

describe('rights', () => {
  it('of several roles add up', () => {
    expect(can(['front-desk', 'clinician'], 'letters.sign')).toBe(true);
    expect(rightsOf(['language-reviewer', 'helper'])).toEqual([
      'wording.read',
      'wording.write',
      'wording.sign-off',
      'family.instructions',
      'family.fasting-check',
    ]);
  });

  it('are none without a role', () => {
    expect(rightsOf([])).toEqual([]);
  });

  it('each belong to somebody', () => {
    expect(rightsOf(roles)).toEqual([...rights]);
  });

  it('never pass from staff to family or back', () => {
    for (const role of roles) {
      const own = rightsOf([role]).filter((right) => family.includes(right));
      expect(own.length > 0).toBe(!isStaffRole(role));
    }
  });

  it('know a role by its name', () => {
    expect(isRole('clinician')).toBe(true);
    expect(isRole('root')).toBe(false);
    expect(isStaffRole('guardian')).toBe(false);
    expect(new Set(rights).size).toBe(rights.length);
  });
});
