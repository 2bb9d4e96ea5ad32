import { randomUUID } from 'node:crypto';
import sharp from 'sharp';
import type { FileView, UploadResult } from '@kerfyard/common/files';
import type { OwnScopeView, ScopeDetailView } from '@kerfyard/common/scopes';
import type { ErrorBody } from '@kerfyard/common/errors';
import { Client } from './client.ts';
import { closeDatabase, sql } from './database.ts';
import { openLine } from './live.ts';
import { waitFor } from './wait.ts';
import {
  addPerson,
  HOME,
  makeCuttingContractor,
  makeGeneralContractor,
  expectStatus,
  type Company,
} from './builders/people.ts';
import {
  completeDraft,
  cutLine,
  inDays,
  lumpBid,
  makeDraft,
  moveDue,
  placeBid,
  publishScope,
} from './builders/scopes.ts';

const fieldsOf = (response: { body: unknown }) =>
  ((response.body as ErrorBody).error.fields ?? []).map((field) => field.path);
const codeOf = (response: { body: unknown }) => (response.body as ErrorBody).error.code;

describe('scopes', () => {
  let gc: Company;
  let otherGc: Company;
  let crew: Company;
  let farCrew: Company;

  beforeAll(async () => {
    [gc, otherGc, crew, farCrew] = await Promise.all([
      makeGeneralContractor(),
      makeGeneralContractor(),
      makeCuttingContractor(),
      makeCuttingContractor({ yard: { zip: '10001', lat: 40.7506, lon: -73.9972 }, serviceRadiusMi: 50 }),
    ]);
  });
  afterAll(closeDatabase);

  const view = async (company: Pick<Company, 'owner'>, id: string) =>
    (await expectStatus(company.owner.client.get(`/api/scopes/${id}`), 200)).body as ScopeDetailView;

  describe('drafts', () => {
    it('are kept as typed, numbers missing and all, with a face for the list', async () => {
      const draft = { ...completeDraft(), site: {}, terms: { notes: 'to be asked' }, bidding: {} };
      draft.cuts = [
        cutLine('A1', { kind: 'line', lengthFt: 12, depthIn: 4, count: 1 }),
        { id: randomUUID(), mark: '', note: '', cut: { kind: 'core', diameterIn: null } },
      ];
      const made = await makeDraft(gc, draft);
      expect(made).toMatchObject({
        status: 'draft',
        body: null,
        isOwn: true,
        draft: { version: 1, body: draft },
      });
      const list = await expectStatus(gc.owner.client.get('/api/scopes?status=draft'), 200);
      const row = (list.body as { items: OwnScopeView[] }).items.find((item) => item.id === made.id);
      expect(row).toMatchObject({ title: draft.title, cutCount: 2, totals: { sawFt: 12, inchFeet: 48 } });
    });

    it('are begun once however often the same request comes, also at once', async () => {
      const id = randomUUID();
      const body = { id, draft: completeDraft() };
      const answers = await Promise.all(
        Array.from({ length: 8 }, () => gc.owner.client.post('/api/scopes', body)),
      );
      expect(new Set(answers.map((answer) => answer.status))).toEqual(new Set([201]));
      expect(new Set(answers.map((answer) => (answer.body as ScopeDetailView).number)).size).toBe(1);
    });

    it('let one of two people win and take the same save sent twice as one', async () => {
      const made = await makeDraft(gc);
      const save = (version: number, title: string) =>
        gc.owner.client.put(`/api/scopes/${made.id}/draft`, { version, draft: completeDraft({ title }) });
      const [first, second] = await Promise.all([save(1, 'one'), save(1, 'two')]);
      expect([first.status, second.status].sort()).toEqual([200, 409]);
      const title = first.status === 200 ? 'one' : 'two';
      const draft = completeDraft({ title });
      const made2 = await view(gc, made.id);
      const again = await gc.owner.client.put(`/api/scopes/${made.id}/draft`, {
        version: 1,
        draft: made2.draft?.body ?? draft,
      });
      expect(again.body).toEqual({ version: 2 });
      expect(codeOf(await save(1, 'three'))).toBe('stale_version');
    });

    it('are nobody else’s: foreign and missing ids answer alike (D-01)', async () => {
      const made = await makeDraft(gc);
      for (const client of [otherGc.owner.client, crew.owner.client]) {
        const foreign = await client.get(`/api/scopes/${made.id}`);
        const missing = await client.get(`/api/scopes/${randomUUID()}`);
        expect([foreign.status, missing.status]).toEqual([404, 404]);
        expect((foreign.body as ErrorBody).error.message).toBe((missing.body as ErrorBody).error.message);
      }
      const draft = completeDraft();
      const taken = await otherGc.owner.client.post('/api/scopes', { id: made.id, draft });
      expect(taken.status).toBe(404);
      const saved = await otherGc.owner.client.put(`/api/scopes/${made.id}/draft`, { version: 1, draft });
      expect(saved.status).toBe(404);
      expect((await otherGc.owner.client.delete(`/api/scopes/${made.id}`)).status).toBe(404);
    });

    it('are thrown away while they are drafts and not after', async () => {
      const made = await makeDraft(gc);
      expect((await gc.owner.client.delete(`/api/scopes/${made.id}`)).status).toBe(204);
      expect((await gc.owner.client.get(`/api/scopes/${made.id}`)).status).toBe(404);
      const published = await publishScope(gc);
      expect(codeOf(await gc.owner.client.delete(`/api/scopes/${published.id}`))).toBe('illegal_move');
    });

    it('refuse fields that are not theirs and bodies past their bounds (D-03, D-28)', async () => {
      const draft = completeDraft();
      const post = (body: object) => gc.owner.client.post('/api/scopes', body);
      expect((await post({ id: randomUUID(), draft, status: 'open' })).status).toBe(422);
      expect((await post({ id: randomUUID(), draft: { ...draft, companyId: otherGc.id } })).status).toBe(422);
      expect((await post({ id: 'nonsense', draft })).status).toBe(422);
      const many = Array.from({ length: 501 }, (_, n) =>
        cutLine(`A${n}`, { kind: 'line', lengthFt: 1, depthIn: 1, count: 1 }),
      );
      expect((await post({ id: randomUUID(), draft: { ...draft, cuts: many } })).status).toBe(422);
      expect((await gc.owner.client.get('/api/scopes?limit=100000')).status).toBe(422);
    });

    it('need sign-in, a general contractor, and a role that decides', async () => {
      const body = { id: randomUUID(), draft: completeDraft() };
      const field = await addPerson(gc, 'field');
      expect((await new Client().post('/api/scopes', body)).status).toBe(401);
      expect((await crew.owner.client.post('/api/scopes', body)).status).toBe(403);
      expect((await field.client.post('/api/scopes', body)).status).toBe(403);
      expect((await crew.owner.client.get('/api/scopes')).status).toBe(403);
    });
  });

  describe('publishing', () => {
    it('makes an immutable first revision with quantities, methods, number and key', async () => {
      const scope = await publishScope(gc);
      expect(scope).toMatchObject({
        status: 'open',
        revision: 1,
        draft: null,
        bidCount: 0,
        totals: { sawFt: 84, inchFeet: 504, coreHoles: 6, coreInches: 48 },
      });
      expect(scope.number).toMatch(/^K-\d{4,}$/);
      expect(scope.methods).toEqual(expect.arrayContaining(['flat_saw', 'core_drill']));
      const change = sql(`UPDATE scope_revision SET body = '{}' WHERE scope_id = $1`, [scope.id], 'owner');
      await expect(change).rejects.toThrow(/append-only/);
      const [key] = await sql<{ size: number }>(
        'SELECT length(wrapped_private_key) AS size FROM scope_key WHERE scope_id = $1',
        [scope.id],
      );
      expect(key?.size).toBeGreaterThan(60);
    });

    it('names every fault of the draft at once, by its dotted path', async () => {
      const draft = completeDraft({ dueAt: inDays(-1) });
      draft.title = '  ';
      draft.site = { ...draft.site, zip: '8020', timeZone: 'Mars/Olympus' };
      draft.responsibilities = draft.responsibilities.slice(1);
      draft.terms = { ...draft.terms, answerDays: null };
      draft.cuts = [
        {
          id: randomUUID(),
          mark: 'A1',
          note: '',
          cut: { kind: 'line', lengthFt: 10, depthIn: null, count: 1 },
        },
        cutLine('A2', {
          kind: 'opening',
          lengthFt: 4,
          widthFt: 8,
          thicknessIn: 8,
          corners: 'overcut',
          bladeDiameterIn: 14,
          count: 1,
        }),
      ];
      const made = await makeDraft(gc, draft);
      const refused = await gc.owner.client.post(`/api/scopes/${made.id}/publish`, { version: 1 });
      expect(refused.status).toBe(422);
      expect(new Set(fieldsOf(refused))).toEqual(
        new Set([
          'title',
          'site.zip',
          'site.timeZone',
          'responsibilities',
          'terms.answerDays',
          'cuts.0.cut.depthIn',
          'cuts.1.cut.bladeDiameterIn',
          'bidding.dueAt',
        ]),
      );
      expect((await view(gc, made.id)).status).toBe('draft');
    });

    it('takes due at most a year ahead', async () => {
      const made = await makeDraft(gc, completeDraft({ dueAt: inDays(500) }));
      const refused = await gc.owner.client.post(`/api/scopes/${made.id}/publish`, { version: 1 });
      expect(fieldsOf(refused)).toEqual(['bidding.dueAt']);
    });

    it('happens once: an older version and a second press are refused', async () => {
      const made = await makeDraft(gc);
      await gc.owner.client.put(`/api/scopes/${made.id}/draft`, { version: 1, draft: completeDraft() });
      const publish = (version: number) =>
        gc.owner.client.post(`/api/scopes/${made.id}/publish`, { version });
      expect(codeOf(await publish(1))).toBe('stale_version');
      const answers = await Promise.all(Array.from({ length: 5 }, () => publish(2)));
      expect(answers.map((answer) => answer.status).sort()).toEqual([200, 409, 409, 409, 409]);
      const rows = await sql('SELECT 1 FROM scope_revision WHERE scope_id = $1', [made.id]);
      expect(rows).toHaveLength(1);
    });

    it('tells crews on the line that the list changed, and those who watch the scope', async () => {
      const line = await openLine(crew.owner.client);
      const scope = await publishScope(gc);
      await line.hint((hint) => hint.topic === 'scopes');
      expect(await line.watch({ topic: 'scope', id: scope.id })).toBe(true);
      await expectStatus(gc.owner.client.post(`/api/scopes/${scope.id}/withdraw`), 200);
      const hint = await line.hint((one) => one.topic === 'scope' && one.scopeId === scope.id);
      expect(hint).toEqual({ topic: 'scope', scopeId: scope.id, seq: scope.seq + 1 });
      line.close();
    });

    it('lets nobody watch what they may not know of', async () => {
      const draft = await makeDraft(gc);
      const scope = await publishScope(gc);
      const line = await openLine(crew.owner.client);
      const rival = await openLine(otherGc.owner.client);
      expect(await line.watch({ topic: 'scope', id: draft.id })).toBe(false);
      expect(await rival.watch({ topic: 'scope', id: scope.id })).toBe(false);
      line.close();
      rival.close();
    });

    it('sends e-mail to crews whose radius and methods fit, and to no others', async () => {
      const scope = await publishScope(gc);
      const [wireOnly] = await Promise.all([makeCuttingContractor({ methods: ['joint_saw'] })]);
      const mailed = async () =>
        (
          await sql<{ to: string }>(
            `SELECT data->>'to' AS to FROM pgboss.job WHERE name = 'send_mail' AND data->>'kind' = 'scope_published'
               AND data->>'scopeId' = $1`,
            [scope.id],
            'super',
          )
        ).map((row) => row.to);
      await waitFor(async () => (await mailed()).includes(crew.owner.userId), 10_000);
      const to = await mailed();
      expect(to).not.toContain(farCrew.owner.userId);
      expect(to).not.toContain(wireOnly.owner.userId);
    });
  });

  describe('what a viewer may see (D-02)', () => {
    it('a crew near by sees it whole, a crew far off without address, contact, access and files', async () => {
      const scope = await publishScope(gc);
      const near = await view(crew, scope.id);
      expect(near).toMatchObject({ isOwn: false, isSiteHeldBack: false, bidCount: null, draft: null });
      expect(near.body?.site.address).toBe('914 Ninth Street');
      expect(near.distanceMi).toBe(0);
      const far = await view(farCrew, scope.id);
      expect(far.isSiteHeldBack).toBe(true);
      expect(JSON.stringify(far)).not.toContain('914 Ninth');
      expect(JSON.stringify(far)).not.toContain('Imani');
      expect(JSON.stringify(far)).not.toContain('Roller door');
      const blurred = (degrees: number) => Math.round(degrees * 10) / 10;
      expect(far.body?.site).toMatchObject({
        lat: blurred(HOME.lat),
        lon: blurred(HOME.lon),
        city: 'Denver',
      });
      expect(far.distanceMi).toBeGreaterThan(300);
    });

    it('an own bid lets a crew from far off see it whole', async () => {
      const scope = await publishScope(gc);
      await placeBid(farCrew, scope.id, lumpBid(250_000));
      expect((await view(farCrew, scope.id)).isSiteHeldBack).toBe(false);
    });

    it('another general contractor sees nothing', async () => {
      const scope = await publishScope(gc);
      expect((await otherGc.owner.client.get(`/api/scopes/${scope.id}`)).status).toBe(404);
    });
  });

  describe('photos and drawings', () => {
    const upload = async (company: Pick<Company, 'owner'>): Promise<FileView> => {
      const create = { width: 40, height: 30, channels: 3 as const, background: '#888' };
      const bytes = await sharp({ create }).png().toBuffer();
      const sending = company.owner.client.prepare('post', '/api/files').field('kind', 'photo');
      const response = await sending.attach('files', bytes, {
        filename: 'wall.png',
        contentType: 'image/png',
      });
      const [file] = (response.body as UploadResult).files;
      if (file === undefined) throw new Error(response.text);
      return file;
    };

    it('are the company’s own, hang on a draft with captions and go with it to those who may see it', async () => {
      const [one, two, foreign] = await Promise.all([upload(gc), upload(gc), upload(otherGc)]);
      const draft = await makeDraft(gc);
      const files = `/api/scopes/${draft.id}/files`;
      const attach = (fileId: string, caption: string) => gc.owner.client.post(files, { fileId, caption });
      await expectStatus(attach(one.id, 'North face'), 201);
      await expectStatus(attach(two.id, ''), 201);
      const again = await expectStatus(attach(one.id, 'North face, wet'), 201);
      expect((again.body as FileView[]).map((file) => [file.id, file.caption])).toEqual([
        [one.id, 'North face, wet'],
        [two.id, ''],
      ]);
      expect(fieldsOf(await attach(foreign.id, ''))).toEqual(['fileId']);
      expect(fieldsOf(await attach(randomUUID(), ''))).toEqual(['fileId']);
      expect((await gc.owner.client.delete(`${files}/${two.id}`)).status).toBe(204);
      const read = (company: Pick<Company, 'owner'>) => company.owner.client.get(`/api/files/${one.id}`);
      expect((await read(crew)).status).toBe(404);
      await expectStatus(gc.owner.client.post(`/api/scopes/${draft.id}/publish`, { version: 1 }), 200);
      expect((await view(crew, draft.id)).files).toMatchObject([{ id: one.id, caption: 'North face, wet' }]);
      expect((await view(farCrew, draft.id)).files).toEqual([]);
      expect((await read(crew)).status).toBe(200);
      expect((await read(farCrew)).status).toBe(404);
      expect((await read(otherGc)).status).toBe(404);
      expect(codeOf(await attach(two.id, ''))).toBe('illegal_move');
      expect(codeOf(await gc.owner.client.delete(`${files}/${one.id}`))).toBe('illegal_move');
      expect((await otherGc.owner.client.post(files, { fileId: foreign.id })).status).toBe(404);
    });
  });

  describe('ending without an award', () => {
    it('withdraws from open and from due, once, and only its own', async () => {
      const scope = await publishScope(gc);
      expect((await otherGc.owner.client.post(`/api/scopes/${scope.id}/withdraw`)).status).toBe(404);
      expect((await crew.owner.client.post(`/api/scopes/${scope.id}/withdraw`)).status).toBe(403);
      await expectStatus(gc.owner.client.post(`/api/scopes/${scope.id}/withdraw`), 200);
      expect(codeOf(await gc.owner.client.post(`/api/scopes/${scope.id}/withdraw`))).toBe('illegal_move');
      expect(codeOf(await crew.owner.client.put(`/api/scopes/${scope.id}/own-bid`, lumpBid(5_000)))).toBe(
        'illegal_move',
      );
    });

    it('closes a due scope with a reason and no open one, and counts it in the record', async () => {
      const company = await makeGeneralContractor();
      const scope = await publishScope(company);
      const close = () =>
        company.owner.client.post(`/api/scopes/${scope.id}/close`, { reason: 'Redesigned' });
      expect(codeOf(await close())).toBe('illegal_move');
      expect((await view(crew, scope.id)).gcRecord).toEqual({ due: 0, awarded: 0 });
      await moveDue(scope.id, -1);
      expect((await view(company, scope.id)).status).toBe('due');
      await expectStatus(close(), 200);
      const seen = await view(crew, scope.id);
      expect(seen).toMatchObject({ status: 'closed_without_award', closedReason: 'Redesigned' });
      expect(seen.gcRecord).toEqual({ due: 1, awarded: 0 });
    });
  });
});
