import { randomUUID } from 'node:crypto';
import type { ErrorBody } from '@kerfyard/common/errors';
import type { VisitView, VisitWindow } from '@kerfyard/common/visits';
import {
  addPerson,
  expectStatus,
  makeCuttingContractor,
  makeGeneralContractor,
  type Person,
} from './builders/people.ts';
import { activeWork, awardedWork, proposeVisit, viewWork, visitBody, windowIn } from './builders/awards.ts';
import { setAside, type Work } from './builders/paid-work.ts';
import { Client } from './client.ts';
import { closeDatabase, sql } from './database.ts';
import { openLine } from './live.ts';
import { mailTo } from './mail.ts';

jest.setTimeout(60_000);
afterAll(closeDatabase);

const codeOf = (response: { body: unknown }) => (response.body as ErrorBody).error.code;
const fieldsOf = (response: { body: unknown }) =>
  ((response.body as ErrorBody).error.fields ?? []).map((field) => field.path);

const confirm = (person: Person, visitId: string, window: VisitWindow | undefined) =>
  person.client.post(`/api/visits/${visitId}/confirm`, { window });
const start = (person: Person, visitId: string) => person.client.post(`/api/visits/${visitId}/start`);
const finish = (person: Person, visitId: string) => person.client.post(`/api/visits/${visitId}/finish`);
const cancel = (person: Person, visitId: string, reason = 'The area is not clear.') =>
  person.client.post(`/api/visits/${visitId}/cancel`, { reason });

async function confirmed(work: Work, windows?: VisitWindow[]): Promise<VisitView> {
  const visit = await proposeVisit(work, windows === undefined ? {} : { windows });
  return (await expectStatus(confirm(work.gc.owner, visit.id, visit.windows[0]), 200)).body as VisitView;
}

async function week(person: Person, from: number, to: number): Promise<VisitView[]> {
  const query = { from: windowIn(from).startsAt, to: windowIn(to).startsAt };
  return (await expectStatus(person.client.get('/api/visits', { query }), 200)).body as VisitView[];
}

describe('proposing a visit', () => {
  it('offers windows to the general contractor, who hears of them', async () => {
    const work = await activeWork();
    const line = await openLine(work.gc.owner.client);
    const windows = [windowIn(30), windowIn(60)];
    const visit = await proposeVisit(work, { windows, note: 'Two people, one saw.' });
    expect(visit).toMatchObject({
      status: 'proposed',
      crew: { id: work.crew.crewId, name: 'Crew 1' },
      truck: { id: work.crew.truckId, name: 'Truck 1' },
      gc: { id: work.gc.id },
      cuttingContractor: { id: work.crew.id },
      timeZone: 'America/Denver',
      windows,
      window: null,
      linesSetAside: false,
      note: 'Two people, one saw.',
    });
    await line.hint((hint) => hint.topic === 'visits');
    line.close();
    const mail = await mailTo(work.gc.owner.email, /Windows on offer for S-/);
    expect(mail.text).toContain(work.crew.name);
    const view = await viewWork(work.gc.owner, work.subcontractId);
    expect(view.visits.map(({ id }) => id)).toEqual([visit.id]);
  });

  it('answers the same request twice with one visit', async () => {
    const work = await activeWork();
    const body = await visitBody(work);
    const answers = await Promise.all(
      Array.from({ length: 6 }, () => work.crew.owner.client.post('/api/visits', body)),
    );
    expect(new Set(answers.map(({ status }) => status))).toEqual(new Set([201]));
    expect(await sql('SELECT 1 FROM visit WHERE subcontract_id = $1', [work.subcontractId])).toHaveLength(1);
  });

  it('names every fault at once: foreign crew and truck, foreign lines, a window in the past', async () => {
    const [work, other] = await Promise.all([activeWork(), activeWork()]);
    const [line] = (await viewWork(other.gc.owner, other.subcontractId)).sov;
    const answer = await work.crew.owner.client.post(
      '/api/visits',
      await visitBody(work, {
        crewId: other.crew.crewId,
        truckId: other.crew.truckId,
        sovLineIds: [line!.id],
        windows: [windowIn(20), windowIn(-3)],
      }),
    );
    expect(answer.status).toBe(422);
    expect(fieldsOf(answer).sort()).toEqual(['crewId', 'sovLineIds', 'truckId', 'windows.1.startsAt']);
    const long = await visitBody(work, { windows: [windowIn(20, 25)] });
    expect(fieldsOf(await work.crew.owner.client.post('/api/visits', long))).toEqual(['windows.0.endsAt']);
  });

  it('needs both signatures, the crew’s side and its roles (D-06)', async () => {
    const unsigned = await awardedWork();
    expect(codeOf(await unsigned.crew.owner.client.post('/api/visits', await visitBody(unsigned)))).toBe(
      'illegal_move',
    );
    const work = await activeWork();
    const body = await visitBody(work);
    const [field, stranger] = await Promise.all([addPerson(work.crew, 'field'), makeCuttingContractor()]);
    expect((await new Client().post('/api/visits', body)).status).toBe(401);
    expect((await work.gc.owner.client.post('/api/visits', body)).status).toBe(403);
    expect((await field.client.post('/api/visits', body)).status).toBe(403);
    expect((await stranger.owner.client.post('/api/visits', body)).status).toBe(404);
    expect((await work.crew.owner.client.post('/api/visits', { ...body, status: 'confirmed' })).status).toBe(
      422,
    );
  });
});

describe('confirming a window', () => {
  it('books crew and truck for one of the windows on offer', async () => {
    const work = await activeWork();
    const windows = [windowIn(30), windowIn(60)];
    const visit = await proposeVisit(work, { windows });
    expect(fieldsOf(await confirm(work.gc.owner, visit.id, windowIn(61)))).toEqual(['window']);
    const answer = await expectStatus(confirm(work.gc.owner, visit.id, windows[1]), 200);
    expect(answer.body).toMatchObject({ status: 'confirmed', window: windows[1], windows: [] });
    const mail = await mailTo(work.crew.owner.email, /^Confirmed for S-/);
    expect(mail.text).toMatch(/M[SD]T/);
    expect(codeOf(await confirm(work.gc.owner, visit.id, windows[0]))).toBe('illegal_move');
  });

  it('lets one of 50 overlapping windows win: no crew and no truck in two places', async () => {
    const [gc, crew] = await Promise.all([makeGeneralContractor(), makeCuttingContractor()]);
    const works = await Promise.all(Array.from({ length: 5 }, () => activeWork(200_000, { gc, crew })));
    const visits = await Promise.all(
      Array.from({ length: 50 }, (_, index) =>
        // Each begins a few minutes after the last, so every two of them overlap and none are equal.
        proposeVisit(works[index % 5]!, { windows: [windowIn(100 + index / 10)] }),
      ),
    );
    const answers = await Promise.all(visits.map((visit) => confirm(gc.owner, visit.id, visit.windows[0])));
    expect(answers.filter(({ status }) => status === 200)).toHaveLength(1);
    const refused = answers.filter(({ status }) => status !== 200);
    expect(new Set(refused.map(codeOf))).toEqual(new Set(['window_taken']));
    const rows = await sql(`SELECT 1 FROM visit WHERE crew_id = $1 AND status = 'confirmed'`, [crew.crewId]);
    expect(rows).toHaveLength(1);
  });

  it('holds a truck apart from a crew: the other crew with the same truck is refused, with its own it is not', async () => {
    const [gc, crew] = await Promise.all([makeGeneralContractor(), makeCuttingContractor()]);
    const work = await activeWork(200_000, { gc, crew });
    const [crewId, truckId] = [randomUUID(), randomUUID()];
    await expectStatus(crew.owner.client.post('/api/company/crews', { id: crewId, name: 'Crew 2' }), 201);
    await expectStatus(crew.owner.client.post('/api/company/trucks', { id: truckId, name: 'Truck 2' }), 201);
    const window = windowIn(200);
    await confirmed(work, [window]);
    const sameTruck = await proposeVisit(work, { crewId, windows: [window] });
    expect(codeOf(await confirm(gc.owner, sameTruck.id, window))).toBe('window_taken');
    const apart = await proposeVisit(work, { crewId, truckId, windows: [window] });
    await expectStatus(confirm(gc.owner, apart.id, window), 200);
    // Half-open: the next visit of the first crew may begin the moment the other ends.
    const next = await proposeVisit(work, {
      windows: [{ startsAt: window.endsAt, endsAt: windowIn(212).endsAt }],
    });
    await expectStatus(confirm(gc.owner, next.id, next.windows[0]), 200);
  });

  it('frees crew and truck when the visit is cancelled', async () => {
    const work = await activeWork();
    const window = windowIn(300);
    const first = await confirmed(work, [window]);
    await expectStatus(cancel(work.gc.owner, first.id), 200);
    const second = await proposeVisit(work, { windows: [window] });
    await expectStatus(confirm(work.gc.owner, second.id, window), 200);
  });

  it('refuses a window that has passed, other people and other roles', async () => {
    const work = await activeWork();
    const visit = await proposeVisit(work);
    const [accounts, stranger] = await Promise.all([addPerson(work.gc, 'accounts'), makeGeneralContractor()]);
    expect(
      (await new Client().post(`/api/visits/${visit.id}/confirm`, { window: visit.windows[0] })).status,
    ).toBe(401);
    expect((await confirm(work.crew.owner, visit.id, visit.windows[0])).status).toBe(403);
    expect((await confirm(accounts, visit.id, visit.windows[0])).status).toBe(403);
    expect((await confirm(stranger.owner, visit.id, visit.windows[0])).status).toBe(404);
    expect((await confirm(work.gc.owner, randomUUID(), visit.windows[0])).status).toBe(404);
    const past = [windowIn(-20)];
    await sql('UPDATE visit SET windows = $2 WHERE id = $1', [visit.id, JSON.stringify(past)], 'owner');
    expect(fieldsOf(await confirm(work.gc.owner, visit.id, past[0]))).toEqual(['window']);
  });
});

describe('the moves of a visit', () => {
  it('D-06: start only when confirmed and paid for, finish only when on site, then no way back', async () => {
    const work = await activeWork(240_000);
    const field = await addPerson(work.crew, 'field');
    const visit = await proposeVisit(work);
    expect(codeOf(await start(field, visit.id))).toBe('illegal_move');
    expect(codeOf(await finish(field, visit.id))).toBe('illegal_move');
    await expectStatus(confirm(work.gc.owner, visit.id, visit.windows[0]), 200);
    expect(codeOf(await start(field, visit.id))).toBe('lines_not_set_aside');
    const { sov } = await viewWork(work.gc.owner, work.subcontractId);
    await setAside(work, [sov[0]!.id]);
    expect(codeOf(await start(field, visit.id))).toBe('lines_not_set_aside');
    await setAside(work, [sov[1]!.id]);
    expect((await start(work.gc.owner, visit.id)).status).toBe(403);

    const answers = await Promise.all(Array.from({ length: 10 }, () => start(field, visit.id)));
    expect(answers.filter(({ status }) => status === 200)).toHaveLength(1);
    expect(answers.find(({ status }) => status === 200)?.body).toMatchObject({
      status: 'on_site',
      linesSetAside: true,
    });
    expect(codeOf(await cancel(work.crew.owner, visit.id))).toBe('illegal_move');
    const done = await expectStatus(finish(field, visit.id), 200);
    expect((done.body as VisitView).finishedAt).not.toBeNull();
    expect(codeOf(await start(field, visit.id))).toBe('illegal_move');
    const audit = await sql<{ action: string }>(
      'SELECT action FROM audit_event WHERE subject_id = $1 ORDER BY id',
      [visit.id],
    );
    expect(audit.map(({ action }) => action)).toEqual([
      'visit.proposed',
      'visit.confirmed',
      'visit.started',
      'visit.finished',
    ]);
  });

  it('cancels from either side with a reason that the other side reads', async () => {
    const work = await activeWork();
    const first = await proposeVisit(work);
    const byCrew = await expectStatus(cancel(work.crew.owner, first.id, 'The saw is in repair.'), 200);
    expect(byCrew.body).toMatchObject({ status: 'cancelled', cancelReason: 'The saw is in repair.' });
    const mail = await mailTo(work.gc.owner.email, /was cancelled/);
    expect(mail.text).toContain('The saw is in repair.');
    expect(codeOf(await confirm(work.gc.owner, first.id, first.windows[0]))).toBe('illegal_move');
    const second = await confirmed(work);
    const field = await addPerson(work.crew, 'field');
    expect((await cancel(field, second.id)).status).toBe(403);
    expect((await cancel(work.gc.owner, second.id, '')).status).toBe(422);
    const stranger = await makeCuttingContractor();
    expect((await cancel(stranger.owner, second.id)).status).toBe(404);
    await expectStatus(cancel(work.gc.owner, second.id), 200);
    await mailTo(work.crew.owner.email, /was cancelled/);
  });
});

describe('the week', () => {
  it('shows own visits of both kinds that touch the span, and nobody else’s', async () => {
    const [gc, crew] = await Promise.all([makeGeneralContractor(), makeCuttingContractor()]);
    const work = await activeWork(200_000, { gc, crew });
    const booked = await confirmed(work, [windowIn(400)]);
    const offered = await proposeVisit(work, { windows: [windowIn(410), windowIn(900)] });
    const later = await proposeVisit(work, { windows: [windowIn(800)] });
    const gone = await proposeVisit(work, { windows: [windowIn(402)] });
    await expectStatus(cancel(crew.owner, gone.id), 200);
    const stranger = await makeCuttingContractor();
    for (const { owner } of [gc, crew]) {
      expect((await week(owner, 390, 500)).map(({ id }) => id)).toEqual([booked.id, offered.id]);
      expect((await week(owner, 790, 910)).map(({ id }) => id)).toEqual([offered.id, later.id]);
    }
    expect(await week(stranger.owner, 390, 910)).toEqual([]);
    const long = { from: windowIn(0).startsAt, to: windowIn(24 * 63).startsAt };
    expect((await gc.owner.client.get('/api/visits', { query: long })).status).toBe(422);
    expect((await new Client().get('/api/visits', { query: long })).status).toBe(401);
  });
});
