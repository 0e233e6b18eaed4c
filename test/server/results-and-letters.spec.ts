import { letterDesk, letterList, letterSigned } from '../../shared/contracts/letters';
import { familyLetter, familyLetterList } from '../../shared/contracts/family-letters';
import {
  resultList,
  specimen as specimenSchema,
  specimenChanged,
  specimenList,
} from '../../shared/contracts/specimens';
import { select } from '../../server/database/connection';
import {
  addClinic,
  addHousehold,
  at,
  iso,
  morningDay,
  type TestHousehold,
} from '../support/mornings';
import { insert } from '../support/insert';
import { type Agent, staffPassword, startTestServer, type TestServer } from '../support/server';

let server: TestServer;
let nurse: Agent;
let colleague: Agent;
let clinician: Agent;
let household: TestHousehold;
let seriesId: number;
let specimenIds: number[];

const day = (n: number): string => `2027-04-${String(13 + n).padStart(2, '0')}`;

beforeAll(async () => {
  server = await startTestServer();
  const { context } = server;
  const siteId = await server.siteId();
  server.setNow(at('06:00'));
  const clinic = await addClinic(context, siteId);
  await context.db.query(
    `UPDATE wordings SET signed_by_staff_id = ${clinic.staffId}, signed_at = '2027-01-05 12:00:00'`,
  );
  household = await addHousehold(context, clinic, [
    { callMe: 'Samira', bornOn: '2025-01-10', arrivalTime: '06:00' },
  ]);
  await context.db.query('UPDATE child_family_members SET sees_results = (standing = "guardian")');
  const [child] = household.children;
  if (!child) throw new Error('no child');
  seriesId = child.seriesId;
  specimenIds = [];
  for (const [index, morningId] of child.morningIds.entries()) {
    const on = day(index);
    await context.db.query(`UPDATE mornings SET state = 'collected' WHERE id = ${morningId}`);
    specimenIds.push(
      await insert(context.db, 'specimens', {
        series_id: seriesId,
        morning_id: morningId,
        child_id: child.childId,
        number: index + 1,
        volume_ml: 6,
        collected_at: new Date(at('06:30', on)),
      }),
    );
  }
  nurse = await server.signInStaff('nurse-coordinator');
  colleague = await server.signInStaff('nurse-coordinator');
  clinician = await server.signInStaff('clinician');
});

afterAll(async () => {
  await server.close();
});

const first = (): number => specimenIds[0] ?? 0;

async function stepAll(): Promise<void> {
  for (const [index, id] of specimenIds.entries()) {
    const on = day(index);
    const steps = [
      { step: 'neutralised', at: iso('06:40', on), with: 'bicarbonate' },
      { step: 'labelled', label: `LAB-${id}` },
      { step: 'handed-over', at: iso('07:30', on) },
      { step: 'received', at: iso('08:30', on), laboratoryNumber: `N-${id}` },
    ];
    for (const [version, step] of steps.entries())
      await nurse
        .post(`/api/clinic/specimens/${id}/steps`)
        .send({ ...step, version: version + 1 })
        .expect(200);
  }
}

const enter = (agent: Agent, id: number, body: object) =>
  agent.post(`/api/clinic/specimens/${id}/results`).send(body);

describe('specimens and results, what is refused', () => {
  test('nobody signed in', async () => {
    for (const path of ['/specimens', '/results', '/letters'])
      expect((await server.visitor().get(`/api/clinic${path}`)).status).toBe(401);
  });

  test('the front desk sees no results and no letters', async () => {
    const desk = await server.signInStaff('front-desk');
    for (const path of ['/results', '/letters'])
      expect((await desk.get(`/api/clinic${path}`)).status).toBe(403);
    const answer = await enter(desk, first(), { test: 'smear', value: 'negative' });
    expect(answer.status).toBe(403);
  });

  test('a nurse does not sign letters', async () => {
    const answer = await nurse.post(`/api/clinic/series/${seriesId}/letters`).send({});
    expect(answer.status).toBe(403);
  });

  test('a specimen that does not exist', async () => {
    const body = { step: 'handed-over', version: 1, at: iso('06:50') };
    const answer = await nurse.post('/api/clinic/specimens/999999/steps').send(body);
    expect([answer.status, answer.body.code]).toEqual([404, 'not-found']);
  });

  test('wrong types name their field', async () => {
    const answer = await nurse
      .post(`/api/clinic/specimens/${first()}/steps`)
      .send({ step: 'neutralised', version: 'one', at: 'yesterday', with: '' });
    expect(answer.status).toBe(422);
    const paths = answer.body.errors.map((error: { path: string }) => error.path);
    expect(paths).toEqual(expect.arrayContaining(['version', 'at', 'with']));
  });

  test('a hand-over without a label, a time before the collection, a result before receipt', async () => {
    const step = (body: object) =>
      nurse.post(`/api/clinic/specimens/${first()}/steps`).send({ version: 1, ...body });
    server.setNow(at('07:00'));
    expect((await step({ step: 'handed-over', at: iso('06:50') })).body.code).toBe('not-labelled');
    const early = await step({ step: 'neutralised', at: iso('06:00'), with: 'bicarbonate' });
    expect(early.body.errors).toEqual([expect.objectContaining({ path: 'at' })]);
    const answer = await enter(nurse, first(), {
      test: 'smear',
      value: 'negative',
      finality: 'final',
      reportedOn: morningDay,
    });
    expect([answer.status, answer.body.code]).toEqual([409, 'not-received']);
  });
});

describe('the way of a specimen', () => {
  test('each step once, a repeat changes nothing, an old version is told', async () => {
    server.setNow(at('12:00', day(2)));
    await stepAll();
    const body = {
      step: 'received',
      version: 5,
      at: iso('08:30'),
      laboratoryNumber: `N-${first()}`,
    };
    const again = await nurse.post(`/api/clinic/specimens/${first()}/steps`).send(body).expect(200);
    expect(specimenChanged.parse(again.body).specimen.version).toBe(5);
    const stale = await nurse
      .post(`/api/clinic/specimens/${first()}/steps`)
      .send({ step: 'rejected', version: 1, at: iso('09:00'), reason: 'leaked' });
    expect([stale.status, stale.body.code]).toEqual([409, 'changed-meanwhile']);
  });

  test('a label belongs to one specimen', async () => {
    const answer = await nurse
      .post(`/api/clinic/specimens/${first()}/steps`)
      .send({ step: 'labelled', version: 5, label: `LAB-${specimenIds[1]}` });
    expect(answer.status).toBe(409);
  });

  test('the list shows clocks, and results only to those who may read them', async () => {
    const own = specimenList.parse((await nurse.get('/api/clinic/specimens')).body);
    expect(own.specimens.map((one) => one.says)).toEqual(
      own.specimens.map(() => expect.stringContaining('At the laboratory')),
    );
    // 42 days after receipt: the demo laboratory profile (Indian national programme, liquid culture).
    expect(own.specimens[0]?.finalExpectedOn).toBe('2027-05-25');
    expect(own.specimens[0]?.results).toEqual([]);
  });
});

describe('results', () => {
  test('a running culture is not final, and no growth is not preliminary', async () => {
    const base = { test: 'culture', reportedOn: day(2) };
    const growing = await enter(nurse, first(), { ...base, value: 'growing', finality: 'final' });
    expect(growing.body.errors).toEqual([expect.objectContaining({ path: 'finality' })]);
    const none = await enter(nurse, first(), {
      ...base,
      value: 'negative-final',
      finality: 'preliminary',
    });
    expect(none.body.errors).toEqual([expect.objectContaining({ path: 'finality' })]);
    const future = await enter(nurse, first(), {
      ...base,
      value: 'no-growth-yet',
      finality: 'preliminary',
      reportedOn: '2027-06-30',
    });
    expect(future.body.errors).toEqual([expect.objectContaining({ path: 'reportedOn' })]);
    const nonsense = await enter(nurse, first(), { ...base, reportedOn: '2027-02-29' });
    expect(nonsense.status).toBe(422);
  });

  test('preliminary first: the letter says that answers are still expected', async () => {
    for (const id of specimenIds)
      await enter(nurse, id, {
        test: 'smear',
        value: 'negative',
        finality: 'final',
        reportedOn: day(2),
      }).expect(200);
    const desk = letterDesk.parse(
      (await clinician.post(`/api/clinic/series/${seriesId}/letter-desk`).send({}).expect(200))
        .body,
    );
    expect(desk.letter).toBe('still-waiting');
    expect(desk.canBeSigned).toBe(false);
    expect(desk.paragraphs.map((part) => part.key)).toContain('does-not-rule-out');
  });

  test('the same entry twice is one result; a changed final needs a reason and keeps the first', async () => {
    server.setNow(at('10:00', '2027-05-27'));
    const final = {
      test: 'culture',
      value: 'contaminated',
      finality: 'final',
      reportedOn: '2027-05-26',
    };
    await enter(nurse, first(), final).expect(200);
    await enter(nurse, first(), final).expect(200);
    const changed = { ...final, value: 'negative-final' };
    const refused = await enter(nurse, first(), changed);
    expect(refused.body.errors).toEqual([expect.objectContaining({ path: 'correctionReason' })]);
    await enter(nurse, first(), { ...changed, correctionReason: 'report corrected' }).expect(200);
    const rows = await select<{ value: string; is_current: number }>(
      server.context.db,
      `SELECT value, is_current FROM results WHERE specimen_id = :id AND test = 'culture' ORDER BY id`,
      { id: first() },
    );
    expect(rows).toEqual([
      { value: 'contaminated', is_current: 0 },
      { value: 'negative-final', is_current: 1 },
    ]);
  });

  test('two people enter the same test at once: one current result', async () => {
    const second = specimenIds[1] ?? 0;
    const body = { test: 'culture', finality: 'final', reportedOn: '2027-05-26' };
    const answers = await Promise.all([
      enter(nurse, second, { ...body, value: 'negative-final' }),
      enter(colleague, second, { ...body, value: 'negative-final' }),
    ]);
    expect(answers.map((answer) => answer.status)).toEqual([200, 200]);
    const rows = await select(
      server.context.db,
      `SELECT id FROM results WHERE specimen_id = :second AND test = 'culture' AND is_current = TRUE`,
      { second },
    );
    expect(rows).toHaveLength(1);
  });

  test('the second look is by another person', async () => {
    await enter(nurse, specimenIds[2] ?? 0, {
      test: 'culture',
      value: 'negative-final',
      finality: 'final',
      reportedOn: '2027-05-26',
    }).expect(200);
    const list = resultList.parse((await nurse.get('/api/clinic/results').expect(200)).body);
    const open = list.series
      .flatMap((series) => series.specimens)
      .flatMap((one) => one.results ?? [])
      .filter((result) => result.needsSecondLook);
    expect(open.length).toBeGreaterThan(0);
    const looker = await server.signInStaff('clinician');
    let mine = 0;
    for (const result of open) {
      const own = await nurse.post(`/api/clinic/results/${result.id}/second-look`).send({});
      if (own.body.code === 'same-person') mine += 1;
      await looker.post(`/api/clinic/results/${result.id}/second-look`).send({}).expect(200);
    }
    expect(mine).toBeGreaterThan(0);
  });
});

const choices = {
  medicines: 'keep-giving',
  medicinesOn: null,
  nextVisitAt: '2027-06-08T16:00:00.000Z',
  leftOut: [],
};

async function resultsSeen(): Promise<number[]> {
  const answer = await clinician.post(`/api/clinic/series/${seriesId}/letter-desk`).send({});
  return letterDesk
    .parse(answer.body)
    .specimens.flatMap((one) => (one.results ?? []).map((result) => result.id));
}

const sign = (body: object) => clinician.post(`/api/clinic/series/${seriesId}/letters`).send(body);

describe('the letter', () => {
  test('is not signed without medicines, next visit, password, or over changed results', async () => {
    const seen = await resultsSeen();
    const base = { release: false, resultsSeen: seen, password: staffPassword };
    const open = await sign({ ...base, choices: {} });
    expect([open.status, open.body.code]).toEqual([409, 'not-ready']);
    expect(open.body.errors.map((error: { path: string }) => error.path)).toEqual(
      expect.arrayContaining(['medicines', 'nextVisitAt']),
    );
    const wrong = await sign({ ...base, choices, password: 'not my password at all' });
    expect(wrong.body.errors).toEqual([expect.objectContaining({ path: 'password' })]);
    const stale = await sign({ ...base, choices, resultsSeen: [1] });
    expect([stale.status, stale.body.code]).toEqual([409, 'results-changed']);
  });

  test('signed and released twice is one letter and one notice, without a word of the matter', async () => {
    const body = {
      choices,
      release: true,
      resultsSeen: await resultsSeen(),
      password: staffPassword,
    };
    const answers = await Promise.all([sign(body), sign(body)]);
    expect(answers.map((answer) => answer.status)).toEqual([200, 200]);
    const ids = answers.map((answer) => letterSigned.parse(answer.body).letterId);
    expect(new Set(ids).size).toBe(1);
    const notices = await select<{ body: string; subject: string | null }>(
      server.context.db,
      `SELECT body, subject FROM messages WHERE kind LIKE 'letter%'`,
    );
    expect(notices.length).toBeLessThanOrEqual(1);
    for (const notice of notices)
      expect(`${notice.subject ?? ''} ${notice.body}`).not.toMatch(
        /tubercul|TB|Samira|Nuur|result/i,
      );
  });

  test('a family reads it only after a code, the clinic sees that it was opened', async () => {
    const near = await server.openFamilySession(household.motherId, 'household');
    expect((await near.get('/api/family/letters')).status).toBe(403);
    const helper = await server.openFamilySession(household.grandmotherId, 'fresh');
    const hidden = await helper.get('/api/family/letters');
    expect(hidden.status === 403 || hidden.body.letters.length === 0).toBe(true);

    const mother = await server.openFamilySession(household.motherId, 'fresh');
    const list = familyLetterList.parse((await mother.get('/api/family/letters').expect(200)).body);
    expect(list.letters).toHaveLength(1);
    const letterId = list.letters[0]?.id ?? 0;
    const before = letterList.parse((await clinician.get('/api/clinic/letters')).body);
    expect(before.letters.find((one) => one.id === letterId)?.openedBy[0]?.openedAt).toBeNull();
    const answer = await mother.get(`/api/family/letters/${letterId}`).expect(200);
    const letter = familyLetter.parse(answer.body);
    const text = letter.paragraphs.map((part) => part.text).join('\n');
    expect(letter.paragraphs.map((part) => part.key).slice(0, 2)).toEqual([
      'medicines',
      'next-visit',
    ]);
    expect(text).toContain('Samira can still have tuberculosis.');
    const after = letterList.parse((await clinician.get('/api/clinic/letters')).body);
    expect(after.letters.find((one) => one.id === letterId)?.openedBy[0]?.openedAt).not.toBeNull();
    await mother
      .get(`/api/family/letters/${letterId}.pdf`)
      .expect(200)
      .expect('content-type', 'application/pdf');
  });

  test('another family’s letter does not exist', async () => {
    const mother = await server.openFamilySession(household.motherId, 'fresh');
    expect((await mother.get('/api/family/letters/424242')).status).toBe(404);
    expect((await mother.get('/api/family/letters/424242.pdf')).status).toBe(404);
    expect((await mother.get('/api/family/letters/one')).status).toBe(422);
  });

  test('a positive result makes a call and holds the letter until a person has told it', async () => {
    const corrected = await enter(nurse, first(), {
      test: 'culture',
      value: 'mtb-complex',
      finality: 'final',
      reportedOn: '2027-05-27',
      correctionReason: 'second growth identified',
    }).expect(200);
    expect(specimenSchema.parse(corrected.body).results?.some((one) => one.isCritical)).toBe(true);
    const calls = await select<{ id: number; reason: string }>(
      server.context.db,
      'SELECT id, reason FROM call_tasks WHERE series_id = :seriesId AND done_at IS NULL',
      { seriesId },
    );
    expect(calls.map((call) => call.reason).sort()).toEqual([
      'positive-result',
      'report-to-health-department',
    ]);
    const held = await sign({
      choices,
      release: true,
      resultsSeen: await resultsSeen(),
      password: staffPassword,
    });
    expect([held.status, held.body.code]).toEqual([409, 'not-ready']);
    expect(held.body.errors.map((error: { path: string }) => error.path)).toEqual(
      expect.arrayContaining(['call-about-positive', 'second-look']),
    );
    const positive = calls.find((call) => call.reason === 'positive-result');
    await clinician
      .post(`/api/clinic/calls/${positive?.id ?? 0}/outcome`)
      .send({ outcome: 'told', interpreter: 'Amina, 4471', note: 'understood' })
      .expect(200);
    const [result] = await select<{ id: number }>(
      server.context.db,
      `SELECT id FROM results WHERE specimen_id = :id AND test = 'culture' AND is_current = TRUE`,
      { id: first() },
    );
    await colleague
      .post(`/api/clinic/results/${result?.id ?? 0}/second-look`)
      .send({})
      .expect(200);
    const contradiction = await sign({
      choices: { ...choices, medicines: 'none-now' },
      release: true,
      resultsSeen: await resultsSeen(),
      password: staffPassword,
    });
    expect(contradiction.body.errors).toEqual([expect.objectContaining({ path: 'medicines' })]);
    await sign({
      choices,
      release: true,
      resultsSeen: await resultsSeen(),
      password: staffPassword,
    }).expect(200);
  });

  test('every view and change is on the access record', async () => {
    const rows = await select<{ matter: string }>(
      server.context.db,
      `SELECT DISTINCT matter FROM access_records JOIN access_record_children ON access_record_id = access_records.id
       WHERE child_id = :childId`,
      { childId: household.children[0]?.childId ?? 0 },
    );
    expect(rows.map((row) => row.matter)).toEqual(
      expect.arrayContaining([
        'specimens',
        'specimen',
        'results',
        'result',
        'second-look',
        'letter-desk',
        'letter-signed',
        'letter-released',
        'letter-opened',
        'letter-pdf',
      ]),
    );
  });
});
