import { FormControl, FormGroup } from '@angular/forms';
import type { SetUp, SiteForm } from '../../../../shared/contracts/set-up';

const control = <Value>(value: Value): FormControl<Value> =>
  new FormControl(value, { nonNullable: true });
const span = ({ from, until }: { from: string; until: string }) =>
  new FormGroup({ from: control(from), until: control(until) });

export type SiteGroup = ReturnType<typeof siteGroup>;

/** A form filled with a site; the numbers of a new one are the usual ones, and the clinic looks at each. */
export const siteGroup = (site: Omit<SiteForm, 'emergencyNumber'> & { emergencyNumber: string }) =>
  new FormGroup({
    name: control(site.name),
    shortName: control(site.shortName),
    address: control(site.address),
    door: control(site.door),
    doorDirections: control(site.doorDirections),
    phone: control(site.phone),
    country: control(site.country),
    region: control(site.region ?? ''),
    zone: control(site.zone),
    emergencyNumber: control(site.emergencyNumber),
    dawnPhone: span(site.dawnPhone),
    dawnLanguages: control([...site.dawnLanguages]),
    clinicWeekdays: control([...site.clinicWeekdays]),
    arrivals: span(site.arrivals),
    minutesPerChild: control(site.minutesPerChild),
    placesPerMorning: control(site.placesPerMorning),
    staffPairs: control(site.staffPairs),
    usualWaitMinutes: control(site.usualWaitMinutes),
    leadDays: control(site.leadDays),
    rideLeadDays: control(site.rideLeadDays),
    reportingLeadDays: control(site.reportingLeadDays),
    longestGapDays: control(site.longestGapDays),
    aheadTextDays: control(site.aheadTextDays),
    aheadTextTime: control(site.aheadTextTime),
    eveningTextTime: control(site.eveningTextTime),
    morningQuestionMinutesBefore: control(site.morningQuestionMinutesBefore),
    nudgeMinutesBefore: control(site.nudgeMinutesBefore),
    callListMinutesBefore: control(site.callListMinutesBefore),
    textsWithoutConsent: control(site.textsWithoutConsent),
  });

/** Another site begins as a copy of this one without what families find it by. */
export const siteLike = (site: SetUp['site']): SetUp['site'] => ({
  ...site,
  name: '',
  shortName: '',
  address: '',
  door: '',
  doorDirections: '',
  phone: '',
});

export interface FieldSpec {
  /** Path of the control. */
  readonly path: string;
  readonly says: string;
  readonly type: 'text' | 'tel' | 'time' | 'number';
  readonly hint?: string;
  readonly isWide?: boolean;
}

const text = (path: string, says: string, more: Partial<FieldSpec> = {}): FieldSpec => ({
  path,
  says,
  type: 'text',
  ...more,
});
const time = (path: string, says: string, hint?: string): FieldSpec =>
  text(path, says, { type: 'time', hint });
const number = (path: string, says: string, hint?: string): FieldSpec =>
  text(path, says, { type: 'number', hint });

/** Where families come to. */
export const placeFields: readonly FieldSpec[] = [
  text('name', $localize`:@@clinic.site.name:Name of the site`),
  text('shortName', $localize`:@@clinic.site.short-name:Name in texts`, {
    hint: $localize`:@@clinic.site.short-name-hint:Others may read it: no disease, no test`,
  }),
  text('address', $localize`:@@clinic.site.address:Address`, { isWide: true }),
  text('door', $localize`:@@clinic.site.door:Door`),
  text('phone', $localize`:@@clinic.site.phone:Telephone`, { type: 'tel' }),
  text('doorDirections', $localize`:@@clinic.site.directions:How to find the door`, {
    isWide: true,
  }),
];

/** When somebody answers before the clinic opens. */
export const dawnFields: readonly FieldSpec[] = [
  time('dawnPhone.from', $localize`:@@clinic.site.dawn-from:Answers from`),
  time('dawnPhone.until', $localize`:@@clinic.site.dawn-until:Answers until`),
];

export const morningFields: readonly FieldSpec[] = [
  time('arrivals.from', $localize`:@@clinic.site.first-arrival:First arrival`),
  time('arrivals.until', $localize`:@@clinic.site.last-arrival:Last arrival`),
  number('placesPerMorning', $localize`:@@clinic.site.places:Children a morning at most`),
  number(
    'staffPairs',
    $localize`:@@clinic.site.pairs:Pairs of staff`,
    $localize`:@@clinic.site.pairs-hint:Two for each child`,
  ),
  number('minutesPerChild', $localize`:@@clinic.site.minutes:Minutes a child in the room`),
  number('usualWaitMinutes', $localize`:@@clinic.site.wait:Minutes from arrival to collection`),
  number(
    'leadDays',
    $localize`:@@clinic.site.lead-days:Days to prepare the family`,
    $localize`:@@clinic.site.lead-days-hint:From planning to the first morning, at the least`,
  ),
  number(
    'rideLeadDays',
    $localize`:@@clinic.site.ride-days:Days to book a ride`,
    $localize`:@@clinic.site.ride-days-hint:Where the family needs one`,
  ),
  number(
    'reportingLeadDays',
    $localize`:@@clinic.site.reporting-days:Days for the report`,
    $localize`:@@clinic.site.reporting-days-hint:Where a suspicion is reported first`,
  ),
  number(
    'longestGapDays',
    $localize`:@@clinic.site.gap-days:Longest gap in days`,
    $localize`:@@clinic.site.gap-days-hint:Between two mornings of one series`,
  ),
];

export const messageFields: readonly FieldSpec[] = [
  number(
    'aheadTextDays',
    $localize`:@@clinic.site.ahead-days:First text: days before`,
    $localize`:@@clinic.site.ahead-hint:0: no such text`,
  ),
  time('aheadTextTime', $localize`:@@clinic.site.ahead-time:First text: at`),
  time('eveningTextTime', $localize`:@@clinic.site.evening:Evening text at`),
  number(
    'morningQuestionMinutesBefore',
    $localize`:@@clinic.site.question-first:Morning question`,
    $localize`:@@clinic.site.question-first-hint:Minutes before arrival`,
  ),
  number(
    'nudgeMinutesBefore',
    $localize`:@@clinic.site.question-again:Asked again`,
    $localize`:@@clinic.site.question-again-hint:Minutes before arrival; 0: not asked again`,
  ),
  number(
    'callListMinutesBefore',
    $localize`:@@clinic.site.person-calls:A person calls`,
    $localize`:@@clinic.site.person-calls-hint:Minutes before arrival, when nobody has answered`,
  ),
];
