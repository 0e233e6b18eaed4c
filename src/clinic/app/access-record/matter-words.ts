/**
 * What was seen or changed, as staff calls it: 'the letter desk'. A matter that has no words here yet is told by its
 * name with spaces, which staff can still read.
 */
export function matterSays(matter: string): string {
  return words[matter] ?? matter.replaceAll('-', ' ');
}

/** A matter that is a deed by itself needs no 'changed' before it; null for all others. */
export function deedSays(matter: string): string | null {
  return deeds[matter] ?? null;
}

const deeds: Record<string, string | undefined> = {
  'child-added': $localize`:@@clinic.deed.child-added:child added`,
  'demo-clinic': $localize`:@@clinic.deed.demo-clinic:demo clinic furnished`,
  'family-sign-in': $localize`:@@clinic.deed.family-sign-in:family signed in`,
  'forget-phone': $localize`:@@clinic.deed.forget-phone:phone forgotten`,
  invitation: $localize`:@@clinic.deed.invitation:invitation sent`,
  'letter-opened': $localize`:@@clinic.deed.letter-opened:letter opened`,
  'letter-released': $localize`:@@clinic.deed.letter-released:letter released`,
  'letter-signed': $localize`:@@clinic.deed.letter-signed:letter signed`,
  'link-locked': $localize`:@@clinic.deed.link-locked:link locked`,
  'morning-lost': $localize`:@@clinic.deed.morning-lost:morning lost`,
  'second-look': $localize`:@@clinic.deed.second-look:second look confirmed`,
  'series-closed': $localize`:@@clinic.deed.series-closed:series closed`,
  'series-planned': $localize`:@@clinic.deed.series-planned:series planned`,
  'sign-in': $localize`:@@clinic.deed.sign-in:signed in`,
};

const words: Record<string, string | undefined> = {
  closing: $localize`:@@clinic.matter.closing:closing a morning`,
  'morning-closed': $localize`:@@clinic.matter.morning-closed:a morning that the clinic closed`,
  site: $localize`:@@clinic.matter.site:a site`,
  'site-added': $localize`:@@clinic.matter.site-added:another site`,
  room: $localize`:@@clinic.matter.room:a room`,
  'room-added': $localize`:@@clinic.matter.room-added:another room`,
  'days-closed': $localize`:@@clinic.matter.days-closed:days closed by the clinic`,
  'days-opened': $localize`:@@clinic.matter.days-opened:days opened again`,
  holiday: $localize`:@@clinic.matter.holiday:a public holiday`,
  alert: $localize`:@@clinic.matter.alert:an alert`,
  'calendar-feed': $localize`:@@clinic.matter.calendar-feed:the family’s calendar address`,
  'contact-consents': $localize`:@@clinic.matter.contact-consents:how the family may be reached`,
  'fasting-protocol': $localize`:@@clinic.matter.fasting-protocol:the fasting protocol`,
  'individual-plan': $localize`:@@clinic.matter.individual-plan:an individual fasting plan`,
  'individual-plans': $localize`:@@clinic.matter.individual-plans:the individual fasting plans`,
  'laboratory-profile': $localize`:@@clinic.matter.laboratory-profile:the laboratory profile`,
  'on-call-list': $localize`:@@clinic.matter.on-call-list:the on-call list`,
  'replan-preview': $localize`:@@clinic.matter.replan-preview:new mornings, as a preview`,
  'replan-proposal': $localize`:@@clinic.matter.replan-proposal:offers of new mornings`,
  'set-out': $localize`:@@clinic.matter.set-out:the set-out list`,
  'supply-list': $localize`:@@clinic.matter.supply-list:the supplies of a morning`,
  'access-record': $localize`:@@clinic.matter.access-record:this record`,
  call: $localize`:@@clinic.matter.call:a call`,
  calls: $localize`:@@clinic.matter.calls:the calls`,
  child: $localize`:@@clinic.matter.child:the child’s record`,
  children: $localize`:@@clinic.matter.children:the list of children`,
  'family-calendar': $localize`:@@clinic.matter.family-calendar:the family’s calendar`,
  'family-letters': $localize`:@@clinic.matter.family-letters:the family’s letters`,
  'family-members': $localize`:@@clinic.matter.family-members:the people of the family`,
  'say-it-back': $localize`:@@clinic.matter.say-it-back:the plan said back by the family`,
  'fasting-check': $localize`:@@clinic.matter.fasting-check:what the family said`,
  'letter-desk': $localize`:@@clinic.matter.letter-desk:the letter desk`,
  'letter-pdf': $localize`:@@clinic.matter.letter-pdf:a printed letter`,
  letters: $localize`:@@clinic.matter.letters:the letters`,
  messages: $localize`:@@clinic.matter.messages:the messages`,
  'morning-change': $localize`:@@clinic.matter.morning-change:late, ill or not coming`,
  'morning-question': $localize`:@@clinic.matter.morning-question:the morning question`,
  'next-morning': $localize`:@@clinic.matter.next-morning:the family’s plan`,
  order: $localize`:@@clinic.matter.order:an order`,
  orders: $localize`:@@clinic.matter.orders:the orders`,
  password: $localize`:@@clinic.matter.password:a password`,
  people: $localize`:@@clinic.matter.people:staff accounts`,
  rehearsal: $localize`:@@clinic.matter.rehearsal:the rehearsal`,
  result: $localize`:@@clinic.matter.result:a result`,
  results: $localize`:@@clinic.matter.results:the results`,
  'series-preview': $localize`:@@clinic.matter.series-preview:what a plan would tell`,
  'series-proposal': $localize`:@@clinic.matter.series-proposal:possible mornings`,
  specimen: $localize`:@@clinic.matter.specimen:a specimen`,
  specimens: $localize`:@@clinic.matter.specimens:the specimens`,
  'this-morning': $localize`:@@clinic.matter.this-morning:This morning`,
};
