import { addDays, type Day } from '../../../shared/domain/day';
import type { Caution, Feeding } from '../../../shared/contracts/common';

/** Invented families. Telephone numbers 555-01xx and example.org lead nowhere. */
export interface DemoAdult {
  readonly fullName: string;
  readonly standing: 'guardian' | 'helper';
  readonly relationship: string;
  readonly phone: string | null;
  readonly email: string | null;
  /** English when it is left out. */
  readonly reads?: string;
  readonly readsHow: 'well' | 'little' | 'no';
  readonly speaks: string;
  readonly needsInterpreter: boolean;
  readonly texts: 'no' | 'yes' | 'also-early';
  readonly mail: boolean;
}

export interface DemoChild {
  readonly fullName: string;
  readonly callMe: string;
  readonly familyLabel: string;
  readonly ageMonths: number;
  readonly recordNumber: string;
  readonly feeding: Feeding;
  readonly cautions: readonly Caution[];
  readonly weightKg: number;
  readonly stage:
    | { readonly kind: 'coming'; readonly place: number; readonly morning: number }
    | { readonly kind: 'to-be-planned' }
    | { readonly kind: 'to-be-signed' }
    | { readonly kind: 'cultures-pending' }
    | { readonly kind: 'all-final' };
}

export interface DemoFamily {
  readonly travelMinutes: number;
  readonly adults: readonly DemoAdult[];
  readonly children: readonly DemoChild[];
}

const mother = (fullName: string, phone: string, more: Partial<DemoAdult> = {}): DemoAdult => ({
  fullName,
  standing: 'guardian',
  relationship: 'mother',
  phone,
  email: null,
  readsHow: 'well',
  speaks: 'English',
  needsInterpreter: false,
  texts: 'also-early',
  mail: false,
  ...more,
});

const child = (
  fullName: string,
  callMe: string,
  familyLabel: string,
  ageMonths: number,
  more: Pick<DemoChild, 'recordNumber' | 'feeding' | 'weightKg' | 'stage'> &
    Partial<Pick<DemoChild, 'cautions'>>,
): DemoChild => ({ fullName, callMe, familyLabel, ageMonths, cautions: [], ...more });

export const demoFamilies: readonly DemoFamily[] = [
  {
    travelMinutes: 40,
    adults: [
      mother('Parwin Rahimi', '+13125550111', {
        email: 'parwin.rahimi@example.org',
        speaks: 'Dari',
        needsInterpreter: true,
        readsHow: 'little',
        mail: true,
      }),
      mother('Najib Rahimi', '+13125550112', {
        relationship: 'father',
        speaks: 'Dari',
        texts: 'yes',
      }),
    ],
    children: [
      child('Noor Rahimi', 'Noor', 'Baby', 7, {
        recordNumber: 'A-1041',
        feeding: 'breast',
        weightKg: 7.4,
        stage: { kind: 'coming', place: 0, morning: 1 },
      }),
      child('Sami Rahimi', 'Sami', 'Big brother', 26, {
        recordNumber: 'A-1042',
        feeding: 'family-food',
        weightKg: 11.8,
        stage: { kind: 'coming', place: 1, morning: 1 },
      }),
    ],
  },
  {
    travelMinutes: 25,
    adults: [
      mother('Salma Haddad', '+13125550121', {
        email: 'salma.haddad@example.org',
        reads: 'ar',
        speaks: 'Arabic',
        mail: true,
      }),
    ],
    children: [
      child('Idris Haddad', 'Idris', 'الصغير', 5, {
        recordNumber: 'A-1045',
        feeding: 'formula',
        weightKg: 6.6,
        stage: { kind: 'coming', place: 2, morning: 1 },
      }),
    ],
  },
  {
    travelMinutes: 50,
    adults: [
      mother('Khin Mya', '+13125550131', { speaks: 'Burmese', texts: 'yes' }),
      {
        fullName: 'Thida',
        standing: 'helper',
        relationship: 'grandmother',
        phone: '+13125550132',
        email: null,
        readsHow: 'well',
        speaks: 'Burmese',
        needsInterpreter: true,
        texts: 'also-early',
        mail: false,
      },
    ],
    children: [
      child('Min Thura', 'Min Thura', 'Our boy', 38, {
        recordNumber: 'A-1037',
        feeding: 'family-food',
        weightKg: 13.9,
        stage: { kind: 'coming', place: 3, morning: 2 },
      }),
    ],
  },
  {
    travelMinutes: 60,
    adults: [
      mother('Dawit Gebre', '', {
        relationship: 'father',
        phone: null,
        email: 'dawit.gebre@example.org',
        speaks: 'Tigrinya',
        texts: 'no',
        mail: true,
      }),
    ],
    children: [
      child('Yonas Gebre', 'Yonas', 'The big one', 53, {
        recordNumber: 'A-1034',
        feeding: 'family-food',
        weightKg: 16.2,
        stage: { kind: 'coming', place: 4, morning: 3 },
      }),
    ],
  },
  {
    travelMinutes: 30,
    adults: [
      mother('Inés Duarte', '+13125550151', {
        email: 'ines.duarte@example.org',
        reads: 'es',
        speaks: 'Spanish',
        mail: true,
      }),
      {
        fullName: 'Amparo Duarte',
        standing: 'helper',
        relationship: 'aunt',
        phone: '+13125550152',
        email: null,
        reads: 'es',
        readsHow: 'well',
        speaks: 'Spanish',
        needsInterpreter: false,
        texts: 'also-early',
        mail: false,
      },
    ],
    children: [
      child('Camila Duarte', 'Camila', 'La niña', 17, {
        recordNumber: 'A-1048',
        feeding: 'family-food',
        weightKg: 9.9,
        stage: { kind: 'to-be-planned' },
      }),
    ],
  },
  {
    travelMinutes: 35,
    adults: [
      mother('Mirlande Joseph', '+13125550161', {
        speaks: 'Haitian Creole',
        needsInterpreter: true,
        readsHow: 'no',
        texts: 'yes',
      }),
    ],
    children: [
      child('Widlin Joseph', 'Widlin', 'Little girl', 14, {
        recordNumber: 'A-1049',
        feeding: 'breast-and-formula',
        cautions: ['prematurity'],
        weightKg: 8.1,
        stage: { kind: 'to-be-signed' },
      }),
    ],
  },
  {
    travelMinutes: 45,
    adults: [
      mother('Hodan Warsame', '+13125550171', {
        speaks: 'Somali',
        needsInterpreter: true,
        texts: 'yes',
      }),
    ],
    children: [
      child('Ayaan Warsame', 'Ayaan', 'Our daughter', 31, {
        recordNumber: 'A-1022',
        feeding: 'family-food',
        weightKg: 12.4,
        stage: { kind: 'cultures-pending' },
      }),
    ],
  },
  {
    travelMinutes: 20,
    adults: [
      mother('Trần Thị Mai', '+13125550181', {
        email: 'mai.tran@example.org',
        speaks: 'Vietnamese',
        texts: 'yes',
        mail: true,
      }),
    ],
    children: [
      child('Trần Gia Linh', 'Linh', 'Linh', 76, {
        recordNumber: 'A-1009',
        feeding: 'family-food',
        weightKg: 19.5,
        stage: { kind: 'all-final' },
      }),
    ],
  },
];

/** A birth date that makes the child so many months old for another good week. */
export function bornOnFor(ageMonths: number, today: Day): Day {
  const [year = 0, month = 1] = today.split('-').map(Number);
  const months = year * 12 + (month - 1) - ageMonths;
  const first = `${Math.floor(months / 12)}-${String((months % 12) + 1).padStart(2, '0')}-01`;
  const dayOfMonth = Number(today.slice(8));
  // Ten days before today's day of the month keeps the age clear of the next birthday.
  return addDays(first, dayOfMonth - 11);
}
