import type { MorningRow } from '../../../../shared/contracts/this-morning';
import { phoneWords } from '../../../common/ui/phone-words';

export type Act =
  | 'arrive'
  | 'door-check'
  | 'begin'
  /** Past the longest fast, with a clinician's reason. */
  | 'go-on'
  | 'collected'
  | 'not-collected'
  | 'feed'
  | 'neutralise'
  | 'label'
  | 'left'
  | 'call';

/** A step that the row offers. */
export interface Offer {
  readonly act: Act;
  readonly says: string;
  /** Under two choices of equal weight: what each leads to. */
  readonly leadsTo?: string;
  readonly roomId?: number;
  readonly phone?: string;
}

/** Into a room; the planned one unless another is named. */
export const begin = (
  room: { readonly id: number; readonly name: string },
  says = $localize`:@@clinic.this-morning.begin:Begin in ${room.name}:room:`,
): Offer => ({ act: 'begin', says, roomId: room.id });

/** Whom to call, the first number first. */
export const callsOf = (row: MorningRow): Offer[] =>
  row.phones.map(({ phone, name, relationship }, index) => ({
    act: 'call',
    says:
      index === 0
        ? $localize`:@@clinic.this-morning.call:Call ${phoneWords(phone)}:phone:`
        : $localize`:@@clinic.this-morning.call-other:${relationship}:relationship:, ${name}:name:: ${phoneWords(phone)}:phone:`,
    phone,
  }));

const words: Readonly<Record<Exclude<Act, 'begin' | 'call'>, string>> = {
  arrive: $localize`:@@clinic.this-morning.arrived:Arrived`,
  'door-check': $localize`:@@clinic.this-morning.door-check:Door check`,
  'go-on': $localize`:@@clinic.this-morning.go-on:Go on`,
  collected: $localize`:@@clinic.this-morning.collected:Collected`,
  'not-collected': $localize`:@@clinic.this-morning.not-collected:Not collected`,
  feed: $localize`:@@clinic.this-morning.feed-now:Feed now`,
  neutralise: $localize`:@@clinic.this-morning.neutralised-now:Neutralised now`,
  label: $localize`:@@clinic.this-morning.label-scanned:Label scanned`,
  left: $localize`:@@clinic.this-morning.gone-home:Gone home`,
};

export const offer = (act: Exclude<Act, 'begin' | 'call'>, says = words[act]): Offer => ({
  act,
  says,
});
