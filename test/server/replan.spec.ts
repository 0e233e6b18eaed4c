import {
  replanOutcome,
  replanProposal,
  type ReplanChange,
  type ReplanProposal,
} from '../../shared/contracts/replan';
import { change, select } from '../../server/database/connection';
import type { DemoClinic } from '../../server/database/seeds/demo-clinic';
import { morningPlansOf } from '../../server/series/morning-plans';
import { startTestServer, type Agent, type TestServer } from '../support/server';
import { readyOrder, signedClinic, wednesday, type ReadyOrder } from '../support/signed-clinic';

let server: TestServer;
let clinician: Agent;
let coordinator: Agent;
let clinic: DemoClinic;

jest.setTimeout(60_000);
beforeAll(async () => {
  server = await startTestServer();
});
beforeEach(async () => {
  server.setNow(wednesday);
  await server.database.empty();
  clinic = await signedClinic(server);
  clinician = await server.signInStaff('clinician');
  coordinator = await server.signInStaff('nurse-coordinator');
});
afterAll(() => server.close());

const post = (path: string, body: object, by: Agent = clinician) =>
  by.post(`/api/clinic${path}`).send(body);
const days = ['2027-04-20', '2027-04-21', '2027-04-22'];

/** Plans the orders on three mornings, each child in the place of its turn. */
async function planned(orders: readonly ReadyOrder[], on = days): Promise<number[]> {
  const times = ['06:00', '06:20'];
  const { body } = await post('/series', {
    orderIds: orders.map(({ orderId }) => orderId),
    days: on.map((day) => ({
      on: day,
      places: orders.map(({ childId }, index) => ({
        childId,
        arrivalTime: times[index],
        roomId: clinic.roomIds[index],
      })),
    })),
    escorts: [],
  }).expect(200);
  return (body.series as { id: number }[]).map(({ id }) => id);
}

const morningsOf = async (seriesId: number) =>
  (await morningPlansOf(server.context.db, { seriesIds: [seriesId] })).map(
    ({ number, on, arrivalTime, state }) => `${number} ${on.slice(5)} ${arrivalTime} ${state}`,
  );
const morningId = async (seriesId: number, on: string): Promise<number> =>
  (await morningPlansOf(server.context.db, { seriesIds: [seriesId] })).find(
    (plan) => plan.on === on && plan.state !== 'lost',
  )?.morningId ?? 0;
const count = async (sql: string): Promise<number> =>
  (await select<{ n: number }>(server.context.db, `SELECT COUNT(*) AS n FROM ${sql}`))[0]?.n ?? 0;

async function proposed(seriesIds: number[], more = {}): Promise<ReplanProposal> {
  const { body } = await post('/series/replan-proposals', { seriesIds, ...more }).expect(200);
  return replanProposal.parse(body);
}

const choiceOf = (
  proposal: ReplanProposal,
  kind: ReplanChange['kind'],
  more: Partial<ReplanChange> = {},
) => ({
  kind,
  seriesIds: proposal.children.map(({ seriesId }) => seriesId),
  days: proposal.offers.find((offer) => offer.kind === kind)?.days ?? [],
  versions: proposal.children.map(({ seriesId, version }) => ({ seriesId, version })),
  reason: 'The family asked for it.',
  ...more,
});

/** As after a morning that went well: only what re-planning looks at. */
async function collected(seriesId: number, on: string): Promise<void> {
  await change(
    server.context.db,
    "UPDATE mornings SET state = 'collected' WHERE series_id = :seriesId AND planned_on = :on",
    { seriesId, on },
  );
}

describe('nobody without the right', () => {
  it.each([
    '/series/replan-proposals',
    '/series/replan-previews',
    '/series/replans',
    '/mornings/1/pause',
  ])('post %s', async (path) => {
    await server.visitor().post(`/api/clinic${path}`).send({}).expect(401);
    const desk = await server.signInStaff('front-desk');
    await desk.post(`/api/clinic${path}`).send({}).expect(403);
  });

  it('re-plans a series that is not there, or of two households at once', async () => {
    await post('/series/replan-proposals', { seriesIds: [999_999] }).expect(404);
    await post('/mornings/999999/pause', { reason: 'fever' }).expect(404);
    const one = await planned([await readyOrder(clinician)]);
    const other = await planned(
      [await readyOrder(clinician)],
      ['2027-04-26', '2027-04-27', '2027-04-28'],
    );
    const { status, body } = await post('/series/replan-proposals', {
      seriesIds: [...one, ...other],
    });
    expect([status, body.errors[0].path]).toEqual([422, 'seriesIds']);
  });

  it('chooses for the clinician: a coordinator looks, prepares and moves, but does not choose', async () => {
    const [seriesId = 0] = await planned([await readyOrder(clinician)]);
    await post(`/mornings/${await morningId(seriesId, '2027-04-21')}/loss`, { reason: 'ill' });
    const { body } = await post('/series/replan-proposals', { seriesIds: [seriesId] }, coordinator);
    expect(body.mayChoose).toBe(false);
    const choice = choiceOf(body, 'next-possible-morning');
    await post('/series/replan-previews', choice, coordinator).expect(200);
    const refused = await post('/series/replans', choice, coordinator);
    expect([refused.status, refused.body.code]).toEqual([403, 'clinician-chooses']);
    expect(await count('replans')).toBe(0);
  });

  it.each([
    ['reason', { reason: '  ' }],
    ['days', { days: [] }],
    ['days', { days: [{ on: '2027-04-23', places: [] }] }],
    ['seriesIds', { seriesIds: [] }],
  ])('bad input says where: %s', async (path, spoiled) => {
    const [seriesId = 0] = await planned([await readyOrder(clinician)]);
    await post(`/mornings/${await morningId(seriesId, '2027-04-21')}/loss`, { reason: 'ill' });
    const choice = choiceOf(await proposed([seriesId]), 'next-possible-morning', spoiled as never);
    const { status, body } = await post('/series/replans', choice);
    expect([status, body.errors[0].path]).toEqual([422, path]);
  });
});

describe('after a lost morning', () => {
  let seriesId: number;
  let childId: number;
  beforeEach(async () => {
    const order = await readyOrder(clinician);
    childId = order.childId;
    [seriesId = 0] = await planned([order]);
    await collected(seriesId, '2027-04-20');
    server.setNow(Date.parse('2027-04-20T20:00:00Z'));
    await post(`/mornings/${await morningId(seriesId, '2027-04-21')}/loss`, {
      reason: 'ill',
    }).expect(200);
  });

  it('offers three ways with dates, and says which days cannot be', async () => {
    const proposal = await proposed([seriesId]);
    expect(proposal.children[0]).toMatchObject({ collected: 1, missing: 1, morningsPlanned: 3 });
    expect(proposal.offers).toMatchObject([
      { kind: 'next-possible-morning', isPossible: true, days: [{ on: '2027-04-23' }] },
      {
        kind: 'new-run',
        isPossible: true,
        days: [{ on: '2027-04-22' }, { on: '2027-04-23' }],
      },
      { kind: 'close-with-fewer', isPossible: true, days: [] },
    ]);
    const refused = proposal.offers[0]?.search.days.find(({ on }) => on === '2027-04-22')?.refused;
    expect(refused).toMatchObject([{ code: 'held-already' }]);
  });

  it('shows before it is chosen what will be, and changes nothing by showing it', async () => {
    const before = await morningsOf(seriesId);
    const messages = await count('messages');
    const choice = choiceOf(await proposed([seriesId]), 'next-possible-morning');
    const { body } = await post('/series/replan-previews', choice).expect(200);
    const preview = replanOutcome.parse(body);
    expect(await morningsOf(seriesId)).toEqual(before);
    expect(await count('messages')).toBe(messages);
    expect(await count('replans')).toBe(0);

    const { body: kept } = await post('/series/replans', choice).expect(200);
    expect(replanOutcome.parse(kept)).toEqual(preview);
    expect(preview.consequences.join(' ')).toContain('Specimen 1 of Zoé stays valid');
    expect(preview.consequences.join(' ')).toContain('the longest gap is 2 days');
    expect(preview.children[0]?.after).toMatchObject([
      { number: 1, on: '2027-04-20', state: 'collected', change: 'kept' },
      { number: 2, on: '2027-04-21', state: 'lost', change: 'kept' },
      { number: 2, on: '2027-04-22', state: 'planned', change: 'kept' },
      { number: 3, on: '2027-04-23', state: 'planned', change: 'new' },
    ]);
    expect(preview.familyWillHear.length).toBeGreaterThan(1);
  });

  it('gives the next morning the number that is free, its invitation, and tells the family the days', async () => {
    const choice = choiceOf(await proposed([seriesId]), 'next-possible-morning');
    await post('/series/replans', choice).expect(200);
    expect(await morningsOf(seriesId)).toEqual([
      '1 04-20 06:00 collected',
      '2 04-21 06:00 lost',
      '2 04-22 06:00 planned',
      '3 04-23 06:00 planned',
    ]);
    const [text] = await select<{ body: string; state: string }>(
      server.context.db,
      "SELECT body, state FROM messages WHERE kind = 'visits-changed' AND channel = 'sms'",
    );
    expect(text?.body).toContain('Thursday, 22 April, 6:00 in the morning');
    expect(text?.body).toContain('Friday, 23 April, 6:00 in the morning');
    expect(text?.body).not.toMatch(/Zoé|Amari|tubercul|test|21 April/i);
    expect(await count("messages WHERE kind = 'calendar' AND morning_on = '2027-04-23'")).toBe(1);
    expect(
      await count("messages WHERE kind = 'evening' AND morning_on = '2027-04-23'"),
    ).toBeGreaterThan(0);
    const [kept] = await select<{ kind: string; reason: string }>(
      server.context.db,
      'SELECT * FROM replans',
    );
    expect(kept).toMatchObject({
      kind: 'next-possible-morning',
      reason: 'The family asked for it.',
    });
    expect(await count("access_records WHERE matter = 'series-replanned'")).toBe(1);
  });

  it('moves what is planned into a new run, so that one calendar entry moves with its morning', async () => {
    const places = [{ childId, arrivalTime: '06:20', roomId: clinic.roomIds[1] ?? 0 }];
    const run = [
      { on: '2027-04-26', places },
      { on: '2027-04-27', places },
    ];
    const [before] = await select<{ uid: string }>(
      server.context.db,
      "SELECT calendar_uid AS uid FROM mornings WHERE planned_on = '2027-04-22'",
    );
    const proposal = await proposed([seriesId]);
    const wrong = {
      ...choiceOf(proposal, 'new-run'),
      days: [run[0], { ...run[1], on: '2027-04-28' }],
    };
    expect((await post('/series/replans', wrong)).body.errors[0].path).toBe('days');
    await post('/series/replans', { ...choiceOf(proposal, 'new-run'), days: run }).expect(200);
    expect(await morningsOf(seriesId)).toEqual([
      '1 04-20 06:00 collected',
      '2 04-21 06:00 lost',
      '2 04-26 06:20 planned',
      '3 04-27 06:20 planned',
    ]);
    const [moved] = await select<{ uid: string; sequence: number }>(
      server.context.db,
      `SELECT calendar_uid AS uid, calendar_sequence AS sequence FROM mornings WHERE planned_on = '2027-04-26'`,
    );
    expect(moved).toEqual({ uid: before?.uid, sequence: 1 });
    const entries = await select<{ calendar: string }>(
      server.context.db,
      "SELECT calendar FROM messages WHERE kind = 'calendar' AND morning_on = '2027-04-26'",
    );
    expect(entries.map(({ calendar }) => calendar).join()).toMatch(/SEQUENCE:1\r\n/);
    expect(
      await count(
        "messages WHERE kind = 'evening' AND state = 'queued' AND morning_on = '2027-04-22'",
      ),
    ).toBe(0);
  });

  it('closes with fewer: the specimen stays, the rest is given up, and nothing more can be changed', async () => {
    const choice = choiceOf(await proposed([seriesId]), 'close-with-fewer');
    const { body } = await post('/series/replans', choice).expect(200);
    expect(body.consequences.join(' ')).toContain('closes with 1 of 3');
    expect(await morningsOf(seriesId)).toEqual([
      '1 04-20 06:00 collected',
      '2 04-21 06:00 lost',
      '2 04-22 06:00 lost',
    ]);
    expect(await count("series WHERE state = 'closed' AND close_reason LIKE 'The family%'")).toBe(
      1,
    );
    expect(
      await count("messages WHERE kind = 'visits-changed' AND body LIKE '%No more visits%'"),
    ).toBeGreaterThan(0);
    const again = await post('/series/replans', choice);
    expect(again.status).toBe(409);
    expect((await proposed([seriesId])).offers).toEqual([]);
  });

  describe('while the child may be fasting for a morning that is no more', () => {
    beforeEach(() => {
      // Eleven in the evening before the morning of 22 April: the night is quiet, the evening text has gone.
      server.setNow(Date.parse('2027-04-22T04:00:00Z'));
    });
    const closes = async (): Promise<void> => {
      await post(
        '/series/replans',
        choiceOf(await proposed([seriesId]), 'close-with-fewer'),
      ).expect(200);
    };

    it('tells at once who agreed to early texts', async () => {
      server.setNow(Date.parse('2027-04-22T06:00:00Z'));
      await closes();
      expect(
        await select(
          server.context.db,
          "SELECT due_at FROM messages WHERE kind = 'visits-changed' AND channel = 'sms'",
        ),
      ).toEqual([{ due_at: new Date('2027-04-22T06:00:00Z') }]);
      expect(await count("call_tasks WHERE reason = 'visits-changed-failed'")).toBe(0);
    });

    it('has everybody else called: a text at eight comes when the family has set out', async () => {
      await change(server.context.db, 'UPDATE contact_consents SET covers_early_morning = FALSE');
      await closes();
      expect(await count("messages WHERE kind = 'visits-changed' AND channel = 'sms'")).toBe(0);
      expect(
        await count("call_tasks WHERE reason = 'visits-changed-failed' AND done_at IS NULL"),
      ).toBe(1);
    });
  });

  it('takes back what was said before and nobody has heard', async () => {
    const choice = choiceOf(await proposed([seriesId]), 'next-possible-morning');
    await post('/series/replans', choice).expect(200);
    await post('/series/replans', choiceOf(await proposed([seriesId]), 'close-with-fewer')).expect(
      200,
    );
    const texts = await select<{ body: string }>(
      server.context.db,
      "SELECT body FROM messages WHERE kind = 'visits-changed' AND channel = 'sms' AND state = 'queued'",
    );
    expect(texts).toHaveLength(1);
    expect(texts[0]?.body).toContain('No more visits');
  });

  it.each([
    [
      'given up',
      async () =>
        post(`/mornings/${await morningId(seriesId, '2027-04-22')}/loss`, { reason: 'x' }),
    ],
    ['closed by the clinic', () => post('/closings/2027-04-22', { reason: 'snow', says: null })],
  ])('a text of new days that still waits names no visit that was %s since', async (_, giveUp) => {
    const choice = choiceOf(await proposed([seriesId]), 'next-possible-morning');
    await post('/series/replans', choice).expect(200);
    expect((await giveUp()).status).toBe(200);
    const texts = await select<{ body: string }>(
      server.context.db,
      "SELECT body FROM messages WHERE kind = 'visits-changed' AND channel = 'sms' AND state = 'queued'",
    );
    expect(texts).toHaveLength(1);
    expect(texts[0]?.body).toContain('23 April');
    expect(texts[0]?.body).not.toContain('22 April');
  });

  it('refuses a choice that was made from an older state', async () => {
    const choice = choiceOf(await proposed([seriesId]), 'next-possible-morning');
    await post('/series/replans', choice).expect(200);
    const { status, body } = await post('/series/replans', choice);
    expect([status, body.code]).toEqual([409, 'changed-meanwhile']);
    expect(await count('mornings')).toBe(4);
  });
});

describe('brothers and sisters', () => {
  it('move together, and can change places with each other', async () => {
    const baby = await readyOrder(clinician, {
      bornOn: '2026-11-02',
      feeding: 'breast',
      callMe: 'Noor',
    });
    const { householdId } = baby.record;
    const big = await readyOrder(clinician, { householdId, callMe: 'Sami', bornOn: '2024-12-01' });
    const seriesIds = await planned([baby, big]);
    const ids = await Promise.all(seriesIds.map((id) => morningId(id, '2027-04-22')));
    const proposal = await proposed(seriesIds, { movedMorningIds: ids });
    const offer = proposal.offers.find(({ kind }) => kind === 'move');
    expect(offer?.search.runs[0]?.days[0]?.on).toBe('2027-04-15');
    const change = {
      kind: 'move',
      seriesIds,
      movedMorningIds: ids,
      days: [
        {
          on: '2027-04-22',
          places: [
            { childId: baby.childId, arrivalTime: '06:20', roomId: clinic.roomIds[1] },
            { childId: big.childId, arrivalTime: '06:00', roomId: clinic.roomIds[0] },
          ],
        },
      ],
      versions: proposal.children.map(({ seriesId, version }) => ({ seriesId, version })),
      reason: 'The big brother comes first.',
    };
    const { body } = await post('/series/replans', change, coordinator).expect(200);
    expect(
      body.children.map((child: { after: { change: string }[] }) => child.after[2]?.change),
    ).toEqual(['moved', 'moved']);
    expect((await morningsOf(seriesIds[0] ?? 0))[2]).toBe('3 04-22 06:20 planned');
    expect((await morningsOf(seriesIds[1] ?? 0))[2]).toBe('3 04-22 06:00 planned');
    expect(await count('mornings WHERE place_key IS NULL')).toBe(0);
  });

  it('keep an answer with its night: a morning that was answered for is given up and made anew', async () => {
    const order = await readyOrder(clinician);
    const [seriesId = 0] = await planned([order]);
    const id = await morningId(seriesId, '2027-04-20');
    await change(
      server.context.db,
      `INSERT INTO fasting_checks (morning_id, source, submission_key, answer, outcome, said, language, received_at)
       VALUES (:id, 'web', 'one', 'nothing', 'come', '{}', 'en', NOW(3))`,
      { id },
    );
    const proposal = await proposed([seriesId], { movedMorningIds: [id] });
    const days = [
      {
        on: '2027-04-23',
        places: [{ childId: order.childId, arrivalTime: '06:00', roomId: clinic.roomIds[0] ?? 0 }],
      },
    ];
    const choice = choiceOf(proposal, 'move', { movedMorningIds: [id], days });
    await post('/series/replans', choice).expect(200);
    expect(await morningsOf(seriesId)).toEqual([
      '1 04-20 06:00 lost',
      '1 04-21 06:00 planned',
      '2 04-22 06:00 planned',
      '3 04-23 06:00 planned',
    ]);
    expect(await morningId(seriesId, '2027-04-23')).not.toBe(id);
  });
});

it('lets one of two have the last place, and gives the other what is left', async () => {
  await change(server.context.db, 'UPDATE sites SET places_per_morning = 1');
  const orders = [await readyOrder(clinician), await readyOrder(clinician)];
  const [one = 0] = await planned([orders[0]!], ['2027-04-19', '2027-04-20', '2027-04-21']);
  const [two = 0] = await planned([orders[1]!], ['2027-04-26', '2027-04-27', '2027-04-28']);
  await post(`/mornings/${await morningId(one, '2027-04-21')}/loss`, { reason: 'ill' });
  await post(`/mornings/${await morningId(two, '2027-04-28')}/loss`, { reason: 'ill' });
  const choices = await Promise.all(
    [one, two].map(async (seriesId, index) => {
      const proposal = await proposed([seriesId]);
      const places = [
        { childId: orders[index]!.childId, arrivalTime: '06:00', roomId: clinic.roomIds[0] ?? 0 },
      ];
      return choiceOf(proposal, 'next-possible-morning', { days: [{ on: '2027-04-30', places }] });
    }),
  );
  const answers = await Promise.all(choices.map((choice) => post('/series/replans', choice)));
  expect(answers.map(({ status }) => status).sort()).toEqual([200, 409]);
  const lost = answers.find(({ status }) => status === 409)?.body;
  expect(lost.code).toBe('place-taken');
  const next = replanProposal.parse(lost.replan).offers[0];
  expect(next?.days[0]?.on).not.toBe('2027-04-30');
  expect(next?.search.days.find(({ on }) => on === '2027-04-30')?.refused[0]?.code).toBe(
    'no-places-left',
  );
});

describe('a pause for an ill child', () => {
  it('loses the morning of today alone and asks again at four in the afternoon, once', async () => {
    const [seriesId = 0] = await planned([await readyOrder(clinician)]);
    await collected(seriesId, '2027-04-20');
    const id = await morningId(seriesId, '2027-04-21');
    const early = await post(`/mornings/${id}/pause`, { reason: 'fever' });
    expect([early.status, early.body.code]).toEqual([409, 'not-today']);
    server.setNow(Date.parse('2027-04-21T10:30:00Z'));
    expect((await post(`/mornings/${id}/pause`, { reason: '' })).status).toBe(422);
    const { body } = await post(`/mornings/${id}/pause`, { reason: 'fever' }, coordinator).expect(
      200,
    );
    expect(body.askedAgainSays).toBe(
      'The family is asked again at 16:00; the call stands on the list.',
    );
    await post(`/mornings/${id}/pause`, { reason: 'fever' }).expect(200);
    expect(await morningsOf(seriesId)).toEqual([
      '1 04-20 06:00 collected',
      '2 04-21 06:00 lost',
      '2 04-22 06:00 planned',
    ]);
    const calls = await select<{ urgent_at: Date }>(
      server.context.db,
      "SELECT urgent_at FROM call_tasks WHERE reason = 'paused-ask-again'",
    );
    expect(calls.map(({ urgent_at }) => urgent_at.toISOString())).toEqual([
      '2027-04-21T21:00:00.000Z',
    ]);
    expect(await count("replans WHERE kind = 'pause'")).toBe(1);
  });

  it('is asked about at once when the afternoon has come already', async () => {
    const [seriesId = 0] = await planned([await readyOrder(clinician)]);
    const now = Date.parse('2027-04-20T22:15:00Z');
    server.setNow(now);
    await post(`/mornings/${await morningId(seriesId, '2027-04-20')}/pause`, {
      reason: 'ill',
    }).expect(200);
    const [call] = await select<{ urgent_at: Date }>(
      server.context.db,
      "SELECT urgent_at FROM call_tasks WHERE reason = 'paused-ask-again'",
    );
    expect(call?.urgent_at.getTime()).toBe(now);
  });
});
