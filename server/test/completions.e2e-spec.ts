import { randomUUID } from 'node:crypto';
import type { CompletionView } from '@kerfyard/common/completions';
import type { ErrorBody } from '@kerfyard/common/errors';
import type { VisitView } from '@kerfyard/common/visits';
import { activeWork, proposeVisit, viewWork } from './builders/awards.ts';
import { setAside, startVisit, type Work } from './builders/paid-work.ts';
import {
  addPerson,
  expectStatus,
  makeCuttingContractor,
  makeGeneralContractor,
  type Person,
} from './builders/people.ts';
import { uploadPhoto } from './builders/world.ts';
import { Client } from './client.ts';
import { closeDatabase, sql } from './database.ts';
import { fileBytes } from './file-bytes.ts';
import { openLine } from './live.ts';
import { mailTo } from './mail.ts';

jest.setTimeout(60_000);
afterAll(closeDatabase);

const codeOf = (response: { body: unknown }) => (response.body as ErrorBody).error.code;
const fieldsOf = (response: { body: unknown }) =>
  ((response.body as ErrorBody).error.fields ?? []).map((field) => field.path);
const submit = (person: Person, body: object) => person.client.post('/api/completions', body);
const move = (person: Person, id: string, action: 'accept' | 'withdraw') =>
  person.client.post(`/api/completions/${id}/${action}`);

/** Signed, set aside and with the crew on site. */
async function workOnSite(): Promise<{ work: Work; visit: VisitView }> {
  const work = await activeWork(440_000);
  await setAside(work);
  return { work, visit: await startVisit(work) };
}

/** A completion of these lines (all of the visit's, unless told) as listed. */
async function body(work: Work, visit: VisitView, sovLineIds = visit.sovLineIds) {
  const { sov } = await viewWork(work.crew.owner, work.subcontractId);
  const cutIds = sov.filter((line) => sovLineIds.includes(line.id)).flatMap((line) => line.cutIds);
  return {
    id: randomUUID(),
    visitId: visit.id,
    sovLineIds,
    asCut: cutIds.map((cutId) => ({ cutId, asListed: true, note: '' })) as object[],
    photoIds: [] as string[],
    note: '',
  };
}

describe('completions', () => {
  it('say what was cut, with photos that the other side may see, and ask for the money of the lines', async () => {
    const { work, visit } = await workOnSite();
    const field = await addPerson(work.crew, 'field');
    const photoIds = [await uploadPhoto(field), await uploadPhoto(work.crew.owner)];
    const input = { ...(await body(work, visit)), photoIds, note: 'Slab was an inch thicker.' };
    input.asCut[0] = { ...input.asCut[0], asListed: false, depthIn: 7, note: 'Thicker' };
    const line = await openLine(work.gc.owner.client);
    const made = (await expectStatus(submit(field, input), 201)).body as CompletionView;
    expect(made).toMatchObject({
      status: 'submitted',
      amountCents: 440_000,
      sovLineIds: visit.sovLineIds,
      submittedBy: field.name,
      acceptedBy: null,
      note: 'Slab was an inch thicker.',
    });
    expect(made.asCut[0]).toMatchObject({ asListed: false, depthIn: 7 });
    expect(made.photos.map(({ id }) => id)).toEqual(photoIds);
    // Seven days to answer, to the end of the seventh day at the site.
    const days = (Date.parse(made.answerBy) - Date.parse(made.submittedAt)) / 86_400_000;
    expect(days).toBeGreaterThanOrEqual(7);
    expect(days).toBeLessThan(8);
    await line.hint((hint) => hint.topic === 'subcontract' && hint.subcontractId === work.subcontractId);
    line.close();
    const mail = await mailTo(work.gc.owner.email, /the crew asks for \$4,400\.00/);
    expect(mail.text).toContain(work.crew.name);
    const view = await viewWork(work.gc.owner, work.subcontractId);
    expect(view.sov.map((row) => row.state)).toEqual(view.sov.map(() => 'submitted'));
    expect((await fileBytes(work.gc.owner.client, photoIds[0]!)).length).toBeGreaterThan(100);
    const stranger = await makeGeneralContractor();
    expect((await stranger.owner.client.get(`/api/files/${photoIds[0]}`)).status).toBe(404);
  });

  it('stand once per line: sent twice it is one, another one for the same line is refused', async () => {
    const { work, visit } = await workOnSite();
    const input = await body(work, visit);
    const same = await Promise.all(Array.from({ length: 6 }, () => submit(work.crew.owner, input)));
    expect(new Set(same.map(({ status }) => status))).toEqual(new Set([201]));
    const other = await body(work, visit, [visit.sovLineIds[0]!]);
    expect(codeOf(await submit(work.crew.owner, other))).toBe('illegal_move');
    const rows = await sql('SELECT 1 FROM completion WHERE subcontract_id = $1', [work.subcontractId]);
    expect(rows).toHaveLength(1);
  });

  it('are accepted once, by the general contractor, whose payers then hear of it', async () => {
    const { work, visit } = await workOnSite();
    const accounts = await addPerson(work.gc, 'accounts');
    const manager = await addPerson(work.gc, 'manager');
    const { id } = (await expectStatus(submit(work.crew.owner, await body(work, visit)), 201))
      .body as CompletionView;
    expect((await move(accounts, id, 'accept')).status).toBe(403);
    expect((await move(work.crew.owner, id, 'accept')).status).toBe(403);
    const answers = await Promise.all(Array.from({ length: 10 }, () => move(manager, id, 'accept')));
    expect(answers.filter(({ status }) => status === 200)).toHaveLength(1);
    expect(answers.find(({ status }) => status === 200)?.body).toMatchObject({
      status: 'accepted',
      acceptedBy: manager.name,
    });
    expect(codeOf(await move(work.crew.owner, id, 'withdraw'))).toBe('illegal_move');
    await mailTo(work.crew.owner.email, /\$4,400\.00 of work accepted/);
    await mailTo(accounts.email, /\$4,400\.00 is ready to be released/);
    const view = await viewWork(work.crew.owner, work.subcontractId);
    expect(view.sov.map((row) => row.state)).toEqual(view.sov.map(() => 'accepted'));
    const ledger = await sql(`SELECT 1 FROM ledger_entry WHERE subcontract_id = $1 AND event = 'E07'`, [
      work.subcontractId,
    ]);
    expect(ledger).toEqual([]);
  });

  it('are taken back while nobody has accepted them; their lines may then be handed in again', async () => {
    const { work, visit } = await workOnSite();
    const first = (await expectStatus(submit(work.crew.owner, await body(work, visit)), 201))
      .body as CompletionView;
    expect((await move(work.gc.owner, first.id, 'withdraw')).status).toBe(403);
    const back = await expectStatus(move(work.crew.owner, first.id, 'withdraw'), 200);
    expect((back.body as CompletionView).status).toBe('withdrawn');
    expect(codeOf(await move(work.gc.owner, first.id, 'accept'))).toBe('illegal_move');
    const view = await viewWork(work.gc.owner, work.subcontractId);
    expect(view.sov.map((row) => row.state)).toEqual(view.sov.map(() => 'set_aside'));
    await expectStatus(submit(work.crew.owner, await body(work, visit)), 201);
  });

  it('let a line be accepted while another is still open', async () => {
    const { work, visit } = await workOnSite();
    const [one, two] = visit.sovLineIds as [string, string];
    const first = (await expectStatus(submit(work.crew.owner, await body(work, visit, [one])), 201))
      .body as CompletionView;
    await expectStatus(move(work.gc.owner, first.id, 'accept'), 200);
    await expectStatus(submit(work.crew.owner, await body(work, visit, [two])), 201);
    const { sov } = await viewWork(work.gc.owner, work.subcontractId);
    const states = Object.fromEntries(sov.map((row) => [row.id, row.state]));
    expect([states[one], states[two]]).toEqual(['accepted', 'submitted']);
  });

  it('name every fault at its field: lines, as-cuts, photos (D-03, D-07)', async () => {
    const { work, visit } = await workOnSite();
    const input = await body(work, visit);
    const post = (change: object) => submit(work.crew.owner, { ...input, id: randomUUID(), ...change });
    const foreign = await uploadPhoto(work.gc.owner);
    const drawing = await uploadPhoto(work.crew.owner, 'document');
    expect(fieldsOf(await post({ sovLineIds: [randomUUID()], asCut: [] }))).toEqual(['sovLineIds']);
    expect(fieldsOf(await post({ asCut: input.asCut.slice(1) }))).toEqual(['asCut']);
    expect(
      fieldsOf(await post({ asCut: [...input.asCut, { cutId: randomUUID(), asListed: true }] })),
    ).toEqual(['asCut.2.cutId']);
    expect(fieldsOf(await post({ photoIds: [foreign, drawing, randomUUID()] }))).toEqual([
      'photoIds.0',
      'photoIds.1',
      'photoIds.2',
    ]);
    const photo = await uploadPhoto(work.crew.owner);
    expect(fieldsOf(await post({ photoIds: [photo, photo] }))).toEqual(['photoIds']);
    expect(fieldsOf(await post({ amountCents: 1 }))).toEqual(['amountCents']);
    expect(fieldsOf(await post({ asCut: [{ ...input.asCut[0], asListed: false }, input.asCut[1]] }))).toEqual(
      ['asCut.0.note'],
    );
    expect(await sql('SELECT 1 FROM completion WHERE subcontract_id = $1', [work.subcontractId])).toEqual([]);
  });

  it('D-06: come after the visit has begun, from the crew, and for others do not exist', async () => {
    const work = await activeWork(440_000);
    const visit = await proposeVisit(work);
    const input = await body(work, visit);
    expect(codeOf(await submit(work.crew.owner, input))).toBe('illegal_move');
    await expectStatus(
      work.gc.owner.client.post(`/api/visits/${visit.id}/confirm`, { window: visit.windows[0] }),
      200,
    );
    expect(codeOf(await submit(work.crew.owner, input))).toBe('illegal_move');
    await setAside(work);
    await expectStatus(work.crew.owner.client.post(`/api/visits/${visit.id}/start`), 200);
    const [accounts, stranger] = await Promise.all([
      addPerson(work.crew, 'accounts'),
      makeCuttingContractor(),
    ]);
    expect((await new Client().post('/api/completions', input)).status).toBe(401);
    expect((await submit(work.gc.owner, input)).status).toBe(403);
    expect((await submit(accounts, input)).status).toBe(403);
    expect((await submit(stranger.owner, input)).status).toBe(404);
    expect((await submit(work.crew.owner, { ...input, visitId: randomUUID() })).status).toBe(404);
    await expectStatus(work.crew.owner.client.post(`/api/visits/${visit.id}/finish`), 200);
    const { id } = (await expectStatus(submit(work.crew.owner, input), 201)).body as CompletionView;
    const otherGc = await makeGeneralContractor();
    expect((await move(otherGc.owner, id, 'accept')).status).toBe(404);
    expect((await move(stranger.owner, id, 'withdraw')).status).toBe(404);
    expect((await move(work.gc.owner, randomUUID(), 'accept')).status).toBe(404);
  });
});
