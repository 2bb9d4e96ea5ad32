import { createHash, randomUUID } from 'node:crypto';
import type { Page } from '@kerfyard/common/api';
import type { ErrorBody } from '@kerfyard/common/errors';
import type { SubcontractListItem, SubcontractView } from '@kerfyard/common/subcontracts';
import {
  addPerson,
  addStaff,
  expectStatus,
  makeCuttingContractor,
  makeGeneralContractor,
  signIn,
} from './builders/people.ts';
import { activeWork, awardedWork, proposeVisit, sign, viewWork, windowIn } from './builders/awards.ts';
import { setAside, signedWork } from './builders/paid-work.ts';
import { Client } from './client.ts';
import { closeDatabase, sql } from './database.ts';
import { openLine } from './live.ts';
import { mailTo } from './mail.ts';
import { readPdfText } from './pdf-text.ts';
import { startQueryCounter } from './query-counter.ts';
import { startSecondServer } from './second-server.ts';
import { fileBytes } from './file-bytes.ts';

jest.setTimeout(60_000);
afterAll(closeDatabase);

const codeOf = (response: { body: unknown }) => (response.body as ErrorBody).error.code;

describe('signing', () => {
  it('by both makes it active, with the signature page behind the stored paper', async () => {
    const work = await awardedWork();
    const line = await openLine(work.crew.owner.client);
    expect(await line.watch({ topic: 'subcontract', id: work.subcontractId })).toBe(true);
    const first = (await expectStatus(sign(work.gc.owner, work.subcontractId), 200)).body as SubcontractView;
    expect(first).toMatchObject({ status: 'awaiting_signatures', side: 'gc', signedDocument: null });
    expect(first.signatures).toMatchObject([
      {
        side: 'gc',
        personName: work.gc.owner.name,
        typedName: work.gc.owner.name,
        ip: '127.0.0.1',
        documentSha256: first.document.sha256,
      },
    ]);
    await line.hint((hint) => hint.topic === 'subcontract' && hint.subcontractId === work.subcontractId);
    line.close();

    const second = (await expectStatus(sign(work.crew.owner, work.subcontractId), 200))
      .body as SubcontractView;
    expect(second.status).toBe('active');
    expect(second.document).toEqual(first.document);
    const signed = await fileBytes(work.gc.owner.client, second.signedDocument?.fileId ?? '');
    expect(createHash('sha256').update(signed).digest('hex')).toBe(second.signedDocument?.sha256);
    const before = await readPdfText(await fileBytes(work.gc.owner.client, second.document.fileId));
    const after = await readPdfText(signed);
    expect(after.slice(0, -1)).toEqual(before);
    const page = (after.at(-1) ?? '').replace(/\s+/g, ' ');
    for (const part of [work.gc.owner.name, work.crew.owner.name, '127.0.0.1', second.document.sha256]) {
      expect(page).toContain(part);
    }
    for (const { owner } of [work.gc, work.crew]) {
      const mail = await mailTo(owner.email, /is signed by both sides/);
      expect(mail.text).toContain(`/work/${work.subcontractId}`);
    }
    const audit = await sql('SELECT 1 FROM audit_event WHERE action = $1 AND subject_id = $2', [
      'subcontract.signed',
      work.subcontractId,
    ]);
    expect(audit).toHaveLength(2);
  });

  it('by both at the same moment still ends in one active subcontract with two signatures', async () => {
    const work = await awardedWork();
    const answers = await Promise.all([
      ...Array.from({ length: 5 }, () => sign(work.gc.owner, work.subcontractId)),
      ...Array.from({ length: 5 }, () => sign(work.crew.owner, work.subcontractId)),
    ]);
    expect(answers.map(({ status }) => status).sort()).toEqual([200, 200, ...Array<number>(8).fill(409)]);
    const view = await viewWork(work.gc.owner, work.subcontractId);
    expect(view.status).toBe('active');
    expect(view.signatures.map((signature) => signature.side).sort()).toEqual(['crew', 'gc']);
    const page = (
      await readPdfText(await fileBytes(work.gc.owner.client, view.signedDocument?.fileId ?? ''))
    ).at(-1);
    expect(page).toContain('For the general contractor');
    expect(page).toContain('For the cutting contractor');
  });

  it('refuses another hash, a second time, and what is above a person’s limit', async () => {
    const work = await awardedWork(500_000);
    const path = `/api/subcontracts/${work.subcontractId}/sign`;
    const { document } = await viewWork(work.gc.owner, work.subcontractId);
    const body = { name: 'Ada Quill', documentSha256: document.sha256 };
    const other = { ...body, documentSha256: 'ab'.repeat(32) };
    expect(codeOf(await work.gc.owner.client.post(path, other))).toBe('document_changed');
    const limited = await addPerson(work.gc, 'manager', { signLimitCents: 499_999 });
    expect(codeOf(await limited.client.post(path, body))).toBe('over_limit');
    const enough = await addPerson(work.gc, 'manager', { signLimitCents: 500_000 });
    await expectStatus(enough.client.post(path, body), 200);
    expect(codeOf(await work.gc.owner.client.post(path, body))).toBe('illegal_move');
    const rows = await sql('SELECT 1 FROM signature WHERE subcontract_id = $1', [work.subcontractId]);
    expect(rows).toHaveLength(1);
  });

  it('needs the role, the side and a proper body', async () => {
    const work = await awardedWork();
    const path = `/api/subcontracts/${work.subcontractId}/sign`;
    const { document } = await viewWork(work.gc.owner, work.subcontractId);
    const body = { name: 'Ada Quill', documentSha256: document.sha256 };
    const [accounts, field, stranger] = await Promise.all([
      addPerson(work.gc, 'accounts'),
      addPerson(work.crew, 'field'),
      makeGeneralContractor(),
    ]);
    expect((await new Client().post(path, body)).status).toBe(401);
    expect((await accounts.client.post(path, body)).status).toBe(403);
    expect((await field.client.post(path, body)).status).toBe(403);
    expect((await stranger.owner.client.post(path, body)).status).toBe(404);
    expect((await work.gc.owner.client.post(`/api/subcontracts/${randomUUID()}/sign`, body)).status).toBe(
      404,
    );
    expect((await work.gc.owner.client.post(path, { ...body, name: '' })).status).toBe(422);
    expect((await work.gc.owner.client.post(path, { ...body, side: 'crew' })).status).toBe(422);
    expect(
      (await work.gc.owner.client.post(path, { name: 'A', documentSha256: 'A'.repeat(64) })).status,
    ).toBe(422);
  });

  it('leaves signatures that nobody can change', async () => {
    const work = await activeWork();
    const change = `UPDATE signature SET typed_name = 'Someone Else' WHERE subcontract_id = $1`;
    await expect(sql(change, [work.subcontractId])).rejects.toThrow(/permission denied/);
    await expect(sql(change, [work.subcontractId], 'owner')).rejects.toThrow(/append-only/);
  });
});

describe('reading', () => {
  it('gives each side its own, by role, and nobody else (D-01, D-02)', async () => {
    const work = await signedWork(300_000);
    await setAside(work);
    const path = `/api/subcontracts/${work.subcontractId}`;
    const gc = await viewWork(work.gc.owner, work.subcontractId);
    expect(gc.sov.every((line) => line.state === 'set_aside')).toBe(true);
    expect(gc.fundings).toHaveLength(1);
    expect(gc.money.setAsideCents).toBe(300_000);
    const [manager, stranger, staff] = await Promise.all([
      addPerson(work.gc, 'manager'),
      makeCuttingContractor(),
      addStaff(work.gc),
    ]);
    const seen = await viewWork(manager, work.subcontractId);
    expect(seen.fundings).toEqual([]);
    expect(seen.money).toEqual(gc.money);
    expect((await stranger.owner.client.get(path)).status).toBe(404);
    expect((await new Client().get(path)).status).toBe(401);
    expect((await staff.client.get(path)).status).toBe(403);
    expect((await work.gc.owner.client.get('/api/subcontracts/nonsense')).status).toBe(404);
    const line = await openLine(stranger.owner.client);
    expect(await line.watch({ topic: 'subcontract', id: work.subcontractId })).toBe(false);
    line.close();
  });

  it('lists own work by key, newest first, with a filter by state', async () => {
    const [gc, crew] = await Promise.all([makeGeneralContractor(), makeCuttingContractor()]);
    const works = [];
    for (let n = 0; n < 5; n += 1) works.push(await awardedWork(100_000 + n, { gc, crew }));
    await expectStatus(sign(gc.owner, works[0]!.subcontractId), 200);
    await expectStatus(sign(crew.owner, works[0]!.subcontractId), 200);
    const newest = works.map((work) => work.subcontractId).reverse();
    for (const { owner } of [gc, crew]) {
      const ids: string[] = [];
      let cursor: string | null = null;
      do {
        const query: Record<string, string | number> = cursor === null ? { limit: 2 } : { limit: 2, cursor };
        const answer = await expectStatus(owner.client.get('/api/subcontracts', { query }), 200);
        const page = answer.body as Page<SubcontractListItem>;
        expect(page.items.length).toBeLessThanOrEqual(2);
        ids.push(...page.items.map((item) => item.id));
        cursor = page.nextCursor;
      } while (cursor !== null);
      expect(ids).toEqual(newest);
    }
    const active = await crew.owner.client.get('/api/subcontracts', { query: { status: 'active' } });
    expect((active.body as Page<SubcontractListItem>).items).toMatchObject([
      {
        id: works[0]!.subcontractId,
        status: 'active',
        gc: { id: gc.id, name: gc.name },
        crew: { id: crew.id },
        city: 'Denver',
        state: 'CO',
        timeZone: 'America/Denver',
        money: { contractCents: 100_000 },
        nextVisitAt: null,
      },
    ]);
    expect((active.body as Page<SubcontractListItem>).items[0]?.cuts).toHaveLength(2);
    const stranger = await makeCuttingContractor();
    const none = await stranger.owner.client.get('/api/subcontracts');
    expect(none.body).toEqual({ items: [], nextCursor: null });
  });

  it('refuses pages past their bounds and cursors that are not ours (D-28)', async () => {
    const { owner } = await makeGeneralContractor();
    const get = (query: object) =>
      owner.client.get('/api/subcontracts', { query: query as Record<string, string> });
    for (const query of [
      { limit: 101 },
      { limit: 0 },
      { status: 'won' },
      { cursor: 'bm90IG91cnM' },
      { sort: 'price' },
    ]) {
      expect((await get(query)).status).toBe(422);
    }
    expect((await new Client().get('/api/subcontracts')).status).toBe(401);
  });

  it('costs the same number of queries for a list of one as for a list of many, visits too', async () => {
    const [gc, crew] = await Promise.all([makeGeneralContractor(), makeCuttingContractor()]);
    const works = await Promise.all(
      Array.from({ length: 6 }, (_, n) => activeWork(100_000 + n, { gc, crew })),
    );
    for (const [index, work] of works.entries()) {
      await proposeVisit(work, { windows: [windowIn(index === 0 ? 20 : 100 + index)] });
    }
    const counter = await startQueryCounter(process.env.TEST_PG_URL ?? '');
    const server = await startSecondServer({ DATABASE_URL: counter.url, RATE_LIMIT_FACTOR: '1000' });
    try {
      const client = await signIn(gc.owner.email, undefined, server.url);
      const cost = async (path: string, query: Record<string, string | number>, items: number) => {
        const costs: number[] = [];
        for (let run = 0; run < 4; run += 1) {
          const before = counter.count('kerfyard-app');
          const { body } = await expectStatus(client.get(path, { query }), 200);
          expect(Array.isArray(body) ? body : (body as Page<unknown>).items).toHaveLength(items);
          costs.push(counter.count('kerfyard-app') - before);
        }
        // The least of four: a timed job of the same server may fall into one of them.
        return Math.min(...costs);
      };
      const subcontracts = [
        await cost('/api/subcontracts', { limit: 1 }, 1),
        await cost('/api/subcontracts', { limit: 25 }, 6),
      ];
      const span = (from: number, to: number) => ({
        from: windowIn(from).startsAt,
        to: windowIn(to).startsAt,
      });
      const visits = [await cost('/api/visits', span(0, 50), 1), await cost('/api/visits', span(0, 200), 6)];
      expect(subcontracts[1]).toBe(subcontracts[0]);
      expect(visits[1]).toBe(visits[0]);
      expect(Math.max(...subcontracts, ...visits)).toBeLessThanOrEqual(5);
    } finally {
      await server.stop();
      await counter.close();
    }
  });
});
