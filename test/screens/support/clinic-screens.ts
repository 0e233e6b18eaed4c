import type { ChildList } from '../../../shared/contracts/children';
import type { OrderList } from '../../../shared/contracts/orders';
import type { LetterList } from '../../../shared/contracts/letters';
import { weekdayOf } from '../../../shared/domain/day';
import { addDays } from '../../../shared/domain/zone';
import type { House, Who } from '../../e2e/support/house';
import type { Screen } from './album';

export const clinicGroups = ['door', 'work', 'children', 'laboratory', 'letters', 'house'] as const;

export interface ClinicGroup {
  /** Whose screen it is; nobody's when it stands before the sign-in. */
  readonly who: Who | null;
  readonly screens: readonly Screen[];
}

const at =
  (path: string) =>
  (language: string): string =>
    `/clinic/${language}/${path}`;

/** Screens of the clinic that need no morning to run. */
export async function clinicGroup(
  house: House,
  group: (typeof clinicGroups)[number],
): Promise<ClinicGroup> {
  const { children } = await house.get<ChildList>('/api/clinic/children');
  const { orders } = await house.get<OrderList>('/api/clinic/orders');
  const { letters } = await house.get<LetterList>('/api/clinic/letters');
  const child = children.find(({ fullName }) => fullName === 'Noor Rahimi');
  const toSign = orders.find(({ childName }) => childName === 'Widlin Joseph');
  const toPlan = orders.find(({ childName }) => childName === 'Camila Duarte');
  const toWrite = letters.find(({ childName }) => childName === 'Trần Gia Linh');
  let sunday = await house.today();
  while (weekdayOf(sunday) !== 7) sunday = addDays(sunday, 1);
  const plan = at(`series/plan?orders=${toPlan?.id}`);
  const groups: Record<typeof group, ClinicGroup> = {
    door: {
      who: null,
      screens: [
        { name: 'sign-in', address: at('sign-in') },
        {
          name: 'sign-in-nothing-typed',
          address: at('sign-in'),
          prepare: (page) => page.locator('form button[type="submit"]').click(),
        },
        { name: 'not-found', address: at('nowhere') },
      ],
    },
    work: {
      who: 'rosa',
      screens: [
        { name: 'this-morning-empty', address: at(`this-morning?on=${sunday}`) },
        { name: 'calls', address: at('calls') },
        { name: 'orders', address: at('orders') },
        { name: 'order-new', address: at(`orders/new?childId=${child?.id}`) },
        { name: 'order-to-sign', address: at(`orders/${toSign?.id}`) },
        { name: 'order-to-plan', address: at(`orders/${toPlan?.id}`) },
      ],
    },
    children: {
      who: 'rosa',
      screens: [
        { name: 'children', address: at('children') },
        { name: 'child-new', address: at('children/new') },
        {
          name: 'child-new-nothing-typed',
          address: at('children/new'),
          prepare: (page) => page.locator('form .buttons .first').click(),
        },
        { name: 'record', address: at(`children/${child?.id}`) },
        { name: 'plan', address: plan },
        {
          name: 'plan-run-chosen',
          address: plan,
          prepare: async (page) => {
            await page.locator('label.run input').first().check();
            await page.locator('.night').first().waitFor();
          },
        },
      ],
    },
    laboratory: {
      who: 'rosa',
      screens: [
        { name: 'specimens', address: at('specimens') },
        { name: 'results', address: at('results') },
        {
          name: 'results-form',
          address: at('results'),
          prepare: async (page) => {
            await page.locator('.specimen .acts button').first().click();
            await page.locator('td-enter-result').waitFor();
          },
        },
      ],
    },
    letters: {
      who: 'okafor',
      screens: [
        { name: 'letters', address: at('letters') },
        { name: 'letter-desk', address: at(`letters/${toWrite?.seriesId}`) },
        { name: 'messages', address: at('messages') },
        { name: 'wording', address: at('wording') },
        { name: 'access-record', address: at('access-record') },
      ],
    },
    house: {
      who: 'milan',
      screens: [
        { name: 'set-up', address: at('set-up') },
        { name: 'staff', address: at('people') },
        { name: 'rehearsal', address: at('rehearsal') },
      ],
    },
  };
  return groups[group];
}
