// The staff of a run: what they enter, plan, call and collect, by the clinic's own interface.
import { Browser } from './requests.mjs';

// Of the furnished clinic: invented people, one invented password.
const password = 'lantern before first light';

export async function openClinic({ origin, tally }) {
  const signIn = async (name) => {
    const browser = new Browser({ origin, network: '10.0.0.1', tally });
    await browser.post('/api/clinic/session', { email: `${name}@alder.example.org`, password });
    return browser;
  };
  const nurse = await signIn('rosa');
  const clinician = await signIn('okafor');
  return { nurse, clinician };
}

/** The children of a family with its adults, their orders signed and consented to. */
export async function enrol({ nurse, clinician }, family, { today, bornOn, now }) {
  const children = [];
  let householdId = null;
  let members = [];
  for (const [index, child] of family.children.entries()) {
    const record = await nurse.post('/api/clinic/children', {
      householdId,
      fullName: child.fullName,
      callMe: child.fullName.split(' ')[0],
      familyLabel: child.label,
      bornOn: bornOn(child),
      recordNumber: `S-${family.number}-${index}`,
      feeding: child.ageDays < 360 ? 'breast' : 'family-food',
      cautions: [],
      travelMinutes: 30,
      familyMembers: family.adults.map((adult) => memberOf(adult)),
      submissionKey: family.uuid(),
    });
    householdId = record.householdId;
    // The first of them also brings the brothers and sisters: known by their numbers and addresses.
    if (index === 0) members = record.familyMembers;
    children.push({
      ...child,
      id: record.id,
      bornOn: bornOn(child),
      members: record.familyMembers,
    });
  }
  const orderIds = [];
  for (const child of children) {
    const guardian = child.members.find(({ standing }) => standing === 'guardian') ?? members[0];
    const order = await nurse.post('/api/clinic/orders', orderOf(family, child));
    await clinician.post(`/api/clinic/orders/${order.id}/signature`, { version: order.version });
    await nurse.post(`/api/clinic/orders/${order.id}/consent`, {
      familyMemberId: guardian.id,
      legalBasis: 'parent',
      how: 'in-person',
      language: 'en',
      formVersion: 'A-3',
      comfortPlan: 'On the lap.',
      hasParentInRoom: true,
      givenAt: new Date(now()).toISOString(),
    });
    orderIds.push(order.id);
  }
  return { householdId, children, orderIds, members, today };
}

const memberOf = (adult) => ({
  fullName: adult.fullName,
  standing: adult.standing,
  relationship: adult.standing === 'guardian' ? 'mother' : 'grandmother',
  legalBasis: adult.standing === 'guardian' ? 'parent' : null,
  mayConsent: adult.standing === 'guardian',
  seesResults: adult.standing === 'guardian',
  phone: adult.phone,
  email: adult.email,
  readsLanguage: adult.language,
  readsHow: adult.readsHow,
  speaksLanguage: adult.language,
  needsInterpreter: adult.language !== 'en',
  agreesToTexts: adult.texts,
  agreesToEarlyTexts: adult.early,
  agreesToMail: adult.mail,
});

const orderOf = (family, child) => ({
  childId: child.id,
  orderedByName: 'Dr. Ines Okafor',
  answerTo: 'Alder Street',
  reason: 'Contact of a person who is ill.',
  morningsPlanned: family.morningsPlanned,
  intendsToTreat: false,
  details: {
    weightKg: 11,
    sourceCase: 'not-known',
    sourceSusceptibility: 'not-known',
    hasBleedingHistory: false,
    hasNoseOrAirwayTrouble: false,
    hasRecentSurgery: false,
    hasInfectiousContactAtHome: false,
  },
  stopCard: {
    hasSuspectedMeningitis: false,
    hasSuspectedMiliaryDisease: false,
    hasBreathingDistress: false,
    isDrowsy: false,
    canBringUpSputum: false,
  },
  submissionKey: family.uuid(),
});

/** Plans the first run that is offered and ends before a day. @returns its days, or null when none is offered. */
export async function plan({ nurse }, family, enrolled, { from, before }) {
  const { orderIds, members } = enrolled;
  const proposal = await nurse.post('/api/clinic/series/proposals', {
    orderIds,
    from,
    morningsPlanned: family.morningsPlanned,
  });
  const run = proposal.runs.find(({ days }) => days.at(-1).on < before);
  if (!run) return null;
  const guardian = members.find(({ standing }) => standing === 'guardian');
  const helper = members.find(({ standing }) => standing === 'helper');
  const escorts = run.days.map(({ on }, index) => ({
    on,
    familyMemberId: (family.mornings[index].helperBrings && helper ? helper : guardian).id,
  }));
  try {
    await nurse.post('/api/clinic/series', { orderIds, days: run.days, escorts });
  } catch (error) {
    // Asked again after the web had fallen: it is done.
    if (error.code !== 'already-planned') throw error;
  }
  const morningIds = new Map();
  for (const child of enrolled.children) {
    const record = await nurse.get(`/api/clinic/children/${child.id}`);
    for (const morning of record.series[0].mornings)
      morningIds.set(`${child.id}:${morning.plannedOn}`, morning.id);
  }
  return run.days.map(({ on, places }, index) => ({
    on,
    escortId: escorts[index].familyMemberId,
    children: places.map(({ childId, arrivalTime, roomId }) => ({
      childId,
      arrivalTime,
      roomId,
      morningId: morningIds.get(`${childId}:${on}`),
    })),
  }));
}

/** The whole morning of one child at the clinic. @returns the state it ends in. */
export async function collect({ nurse, clinician }, { on, morningId, roomId, isCollected, now }) {
  const rowOf = async () => {
    const sheet = await nurse.get(`/api/clinic/this-morning?on=${on}`);
    return sheet.rows.find((row) => row.morningId === morningId);
  };
  const at = `/api/clinic/mornings/${morningId}`;
  let { version } = await rowOf();
  version = (await nurse.post(`${at}/arrival`, { version })).row.version;
  const check = await clinician.post(`${at}/door-checks`, {
    version,
    lastFoodAt: null,
    lastDrinkAt: null,
    isNothingSincePlan: true,
    wokeAt: null,
    isWell: true,
    broughtBy: 'family',
    goOnReason: 'The clinician has looked and goes on.',
  });
  version = (await nurse.post(`${at}/collection`, { version: check.row.version, roomId })).row
    .version;
  await nurse.put(`${at}/collection`, {
    version,
    ...(isCollected
      ? { outcome: 'collected', collectedAt: new Date(now()).toISOString(), volumeMl: 5 }
      : { outcome: 'not-collected', reason: 'Vomited' }),
  });
  return (await rowOf()).state;
}
