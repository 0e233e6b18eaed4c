import { clinicSession } from '../../shared/contracts/clinic-session';
import { childRecord } from '../../shared/contracts/children';
import { messageList } from '../../shared/contracts/messages';
import { problem } from '../../shared/contracts/problem';
import { resultList, specimenList } from '../../shared/contracts/specimens';
import { setUp } from '../../shared/contracts/set-up';
import { thisMorning } from '../../shared/contracts/this-morning';
import { insert } from '../support/insert';
import {
  addClinic,
  addHousehold,
  at,
  iso,
  maryamAndYusuf,
  type TestClinic,
  type TestHousehold,
} from '../support/mornings';
import { startTestServer, type Agent, type TestServer } from '../support/server';

let server: TestServer;
let clinic: TestClinic;
let household: TestHousehold;
let nurse: Agent;
let clinician: Agent;

beforeAll(async () => {
  server = await startTestServer();
  const { context } = server;
  clinic = await addClinic(context, await server.siteId());
  household = await addHousehold(context, clinic, maryamAndYusuf);
  nurse = await server.signInStaff('nurse-coordinator');
  clinician = await server.signInStaff(['clinician', 'administrator']);
  server.setNow(at('07:05'));
  const [{ morningId, childId, seriesId } = { morningId: 0, childId: 0, seriesId: 0 }] =
    household.children;
  const specimenId = await insert(context.db, 'specimens', {
    series_id: seriesId,
    morning_id: morningId,
    child_id: childId,
    number: 1,
    label: 'LAB-1',
    volume_ml: 6,
    collected_at: new Date(at('06:30')),
    neutralised_at: new Date(at('06:40')),
    received_at: new Date(at('07:00')),
  });
  await insert(context.db, 'results', {
    specimen_id: specimenId,
    child_id: childId,
    test: 'smear',
    value: 'negative',
    finality: 'preliminary',
    reported_on: '2027-04-13',
    entered_at: new Date(at('07:04')),
    entered_by_staff_id: clinic.staffId,
    current_key: `${specimenId}:smear`,
  });
});
afterAll(() => server.close());

const read = (path: string, language: string, agent = clinician) =>
  agent.get(`/api/clinic${path}`).set('Accept-Language', language);
const spanish = async (path: string, agent = clinician): Promise<unknown> =>
  (await read(path, 'es', agent).expect(200)).body;

/** Texts that read the same in both answers and hold an English word. */
function leftInEnglish(one: unknown, other: unknown, path = ''): string[] {
  if (typeof one === 'string')
    return one === other && englishWords.test(one) ? [`${path}: ${one}`] : [];
  if (typeof one !== 'object' || one === null || typeof other !== 'object' || other === null)
    return [];
  return Object.entries(one).flatMap(([key, value]) =>
    leftInEnglish(value, (other as Record<string, unknown>)[key], `${path}.${key}`),
  );
}
const englishWords =
  /\b(the|is|are|not|and|of|by|at|for|until|after|from|child|children|specimen|result|minutes?|days|years?|months?)\b/i;

describe('which language a screen hears', () => {
  test.each([
    ['es', 'es'],
    ['es-US', 'es'],
    ['es-MX,es;q=0.9,en;q=0.8', 'es'],
    ['en', 'en'],
    ['ar', 'en'],
    ['', 'en'],
  ])('%j is answered in %s', async (wanted, answered) => {
    const { summary } = thisMorning.parse((await read('/this-morning', wanted).expect(200)).body);
    expect(summary).toBe(
      answered === 'es' ? 'Dos niños: dos sin respuesta.' : 'Two children: two not heard from.',
    );
  });
});

test('no sentence stays in English', async () => {
  const [{ childId } = { childId: 0 }] = household.children;
  const paths = [
    '/this-morning',
    '/specimens',
    '/results',
    '/orders',
    '/children',
    `/children/${childId}`,
    '/calls',
    '/messages',
    '/letters',
    '/set-up',
  ];
  for (const path of paths) {
    const { body } = await read(path, 'en').expect(200);
    // Names, what somebody typed and the ids of rules are data.
    const left = leftInEnglish(await spanish(path), body).filter(
      (text) =>
        !/\.(name|title|reason|address|body|subject|kind|state|familyLabel|rule|by|doorDirections): /.test(
          text,
        ),
    );
    expect([path, left]).toEqual([path, []]);
  }
});

test('this morning says whose hours and clocks they are', async () => {
  const sheet = thisMorning.parse(await spanish('/this-morning', nurse));
  expect(sheet.protocolSays).toBe(
    'Horas: Protocolo de ayuno de Harbor Clinic, versión 3. Valores iniciales, por confirmar por la clínica.',
  );
  expect(sheet.laboratorySays).toContain('Relojes de las muestras: ');
  expect(sheet.rooms[0]?.says).toBe('Libre. Cerrada 60 minutos después de cada niño.');
  expect(sheet.rows[0]?.ageInWords).toMatch(/^\d+ (meses|años)$/);
  expect(sheet.rows.map(({ verdictSays }) => verdictSays)).toContain('No se sabe');
});

test('specimens and results', async () => {
  const { specimens, laboratorySays } = specimenList.parse(await spanish('/specimens'));
  expect(specimens[0]?.says).toMatch(
    /^En el laboratorio\. Respuesta final esperada para el \p{L}+, \d+ de \p{L}+\.$/u,
  );
  expect(laboratorySays).toContain('firmado por Dr. Lena Okafor el lunes, 4 de enero');
  const { series } = resultList.parse(await spanish('/results'));
  expect(series[0]?.says).toBe('Todavía falta una respuesta final.');
  expect(series[0]?.specimens[0]?.results?.[0]?.says).toBe(
    'Baciloscopia: no se ven bacilos ácido-alcohol resistentes, preliminar',
  );
});

test('the record of a child tells what happened', async () => {
  const [{ childId } = { childId: 0 }] = household.children;
  const record = childRecord.parse(await spanish(`/children/${childId}`));
  const says = record.happenings.map((happening) => happening.says);
  expect(says).toContain('Muestra 1: 6 mL, neutralizada a los 10 minutos.');
  expect(says).toContain(
    'Muestra 1. Baciloscopia: no se ven bacilos ácido-alcohol resistentes, preliminar.',
  );
  expect(says.join(' ')).toMatch(/Serie de 3 mañanas planeada\./);
});

test('set-up and messages', async () => {
  const { protocols, laboratoryProfiles } = setUp.parse(await spanish('/set-up'));
  expect(protocols[0]?.bands.map(({ age }) => age)).toContain('menos de 3 meses');
  expect(laboratoryProfiles[0]?.lines[0]).toEqual({
    says: 'Recibe los',
    value: expect.stringMatching(/^lunes, .* y /),
  });
  const { health } = messageList.parse(await spanish('/messages'));
  expect(health.says).toBe('Todo lo que tocaba ya salió.');
});

describe('what is refused', () => {
  const refused = async (answer: Promise<{ body: unknown }>) => problem.parse((await answer).body);

  test('before anybody is signed in', async () => {
    const visitor = server.visitor();
    expect((await refused(read('/this-morning', 'es', visitor).expect(401))).title).toBe(
      'Inicie sesión primero.',
    );
    const wrong = visitor
      .post('/api/clinic/session')
      .set('Accept-Language', 'es')
      .send({ email: 'nobody@example.org', password: 'wrong wrong wrong' })
      .expect(401);
    expect((await refused(wrong)).title).toBe(
      'El correo electrónico o la contraseña no son correctos.',
    );
  });

  test('rights, what is not there, and fields', async () => {
    const desk = await server.signInStaff('front-desk');
    expect((await refused(read('/results', 'es', desk).expect(403))).title).toBe(
      'Sus funciones no incluyen esto.',
    );
    expect((await refused(read('/children/99999', 'es').expect(404))).title).toBe(
      'Esto no existe, o usted no puede verlo.',
    );
    const [child] = household.children;
    const early = nurse
      .post(`/api/clinic/mornings/${child?.morningId}/collection`)
      .set('Accept-Language', 'es')
      .send({ version: 1, roomId: clinic.roomIds[0] })
      .expect(409);
    expect((await refused(early)).title).toBe('Este niño todavía no llegó.');
    const fields = clinician
      .post(`/api/clinic/mornings/${child?.morningId}/loss`)
      .set('Accept-Language', 'es')
      .send({ reason: '' })
      .expect(422);
    const { title, errors } = await refused(fields);
    expect(title).toBe('Hay que revisar algunas respuestas.');
    expect(errors?.map(({ message }) => message)).toContain('Complete este campo.');
  });

  test('warnings and sentences of a change come in the language of the screen too', async () => {
    const [, child] = household.children;
    const arrived = await nurse
      .post(`/api/clinic/mornings/${child?.morningId}/arrival`)
      .set('Accept-Language', 'es')
      .send({ version: 1 })
      .expect(200);
    expect(arrived.body.row.cautions.concat(arrived.body.row.warnings).join(' ')).not.toMatch(
      englishWords,
    );
    const checked = await nurse
      .post(`/api/clinic/mornings/${child?.morningId}/door-checks`)
      .set('Accept-Language', 'es')
      .send({
        version: 2,
        lastFoodAt: null,
        lastDrinkAt: null,
        isNothingSincePlan: true,
        medicine: '',
        wokeAt: iso('05:50'),
        isWell: false,
        broughtBy: 'abuela',
        goOnReason: '',
      })
      .expect(200);
    expect(checked.body.row.doorCheck.says).toBe(
      'Nada desde la hora del plan, despertó a las 05:50, no se ve bien, con abuela.',
    );
    expect(checked.body.warnings).toEqual(['El niño no está bien: decide un médico.']);
  });
});

test('the session answers whatever the language is', async () => {
  const { body } = await read('/session', 'es').expect(200);
  expect(clinicSession.parse(body).staff.fullName).toContain('clinician');
});
