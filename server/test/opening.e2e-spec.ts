import { execFile } from 'node:child_process';
import { readdir, readFile } from 'node:fs/promises';
import { join } from 'node:path';
import { promisify } from 'node:util';
import type { BidTabulationView } from '@kerfyard/common/bids';
import type { ErrorBody } from '@kerfyard/common/errors';
import type { ScopeDetailView } from '@kerfyard/common/scopes';
import { closeDatabase, sql } from './database.ts';
import { waitFor } from './wait.ts';
import {
  expectStatus,
  makeCuttingContractor,
  makeGeneralContractor,
  type Company,
} from './builders/people.ts';
import { comeDue, linesBid, lumpBid, moveDue, placeBid, publishScope } from './builders/scopes.ts';

const run = promisify(execFile);
const sleep = (ms: number) => new Promise((resolve) => setTimeout(resolve, ms));
const codeOf = (response: { body: unknown }) => (response.body as ErrorBody).error.code;

/** Every table of the database as SQL text, bytes as hexadecimal. */
async function dumpDatabase(): Promise<string> {
  const url = process.env.TEST_PG_SUPER_URL ?? '';
  const { stdout } = await run('pg_dump', ['--no-owner', '--inserts', url], {
    maxBuffer: 1024 * 1024 * 1024,
  });
  return stdout;
}

async function everyFile(folder: string): Promise<Buffer[]> {
  const entries = await readdir(folder, { withFileTypes: true, recursive: true });
  const files = entries.filter((entry) => entry.isFile());
  return Promise.all(files.map((entry) => readFile(join(entry.parentPath, entry.name))));
}

describe('the opening of sealed bids', () => {
  let gc: Company;
  let crews: Company[];

  beforeAll(async () => {
    gc = await makeGeneralContractor();
    crews = await Promise.all(Array.from({ length: 12 }, () => makeCuttingContractor()));
  });
  afterAll(closeDatabase);

  const tabulation = (scopeId: string) => gc.owner.client.get(`/api/scopes/${scopeId}/bids`);
  const rowsOf = (scopeId: string) =>
    sql<{ id: string; total_cents: string; status: string }>(
      'SELECT id, total_cents, status FROM bid WHERE scope_id = $1',
      [scopeId],
    );
  const crew = (n: number): Company => {
    const found = crews[n];
    if (found === undefined) throw new Error('no such crew');
    return found;
  };

  it('leaves no trace of an amount in a dump of the database, the files or the logs before due', async () => {
    const scope = await publishScope(gc);
    // Nine digits each, so that no time, id or hexadecimal holds one by chance.
    const lump = 739_184_627;
    const rate = 6_281_947_300;
    await expectStatus(
      crew(0).owner.client.put(`/api/scopes/${scope.id}/bid-draft`, {
        draft: { lump: '7391846.27', text: '$7,391,846.27', cents: lump },
      }),
      200,
    );
    await placeBid(crew(0), scope.id, lumpBid(lump));
    await placeBid(crew(0), scope.id, lumpBid(lump + 1));
    await placeBid(crew(0), scope.id, lumpBid(lump));
    await placeBid(crew(1), scope.id, linesBid(scope, rate / 10_000));
    await expectStatus(
      crew(1).owner.client.put(`/api/scopes/${scope.id}/bid-draft`, {
        draft: { rate, note: 'at 62,819,473' },
      }),
      200,
    );
    // A key sent along must not make the reply, which carries the amount, be kept.
    await crew(0).owner.client.put(`/api/scopes/${scope.id}/own-bid`, lumpBid(lump), {
      headers: { 'Idempotency-Key': '0192f000-0000-7000-8000-0000000000aa' },
    });
    await tabulation(scope.id);
    await crew(0).owner.client.get('/api/bids');
    await sleep(700);
    const needles = [
      '739184627',
      '7391846.27',
      '7,391,846.27',
      '739184628',
      '6281947300',
      '62819473',
      '62,819,473',
      lump.toString(16),
    ];
    const places: [string, Buffer | string][] = [
      ['the dump', await dumpDatabase()],
      ...(await everyFile(process.env.TEST_FILES_DIR ?? '')).map(
        (bytes) => ['a file', bytes] as [string, Buffer],
      ),
      ...(await everyFile(process.env.TEST_LOGS_DIR ?? '')).map(
        (bytes) => ['a log', bytes] as [string, Buffer],
      ),
    ];
    expect(places[0]?.[1]).toContain(scope.id);
    const hexOf = (text: string) => Buffer.from(text).toString('hex');
    const found = places.flatMap(([place, content]) =>
      needles
        .flatMap((needle) => [needle, hexOf(needle)])
        .filter((needle) => content.includes(needle))
        .map((needle) => `${needle} in ${place}`),
    );
    expect(found).toEqual([]);
    // The same search finds them once they are opened, so it can fail.
    await comeDue(gc, scope.id);
    const after = await dumpDatabase();
    expect(after).toContain('739184627');
  });

  it('writes bids, lines, audit and the new state at once and only once, however many ask', async () => {
    const scope = await publishScope(gc);
    await placeBid(crew(0), scope.id, lumpBid(400_000));
    await placeBid(crew(1), scope.id, linesBid(scope, 7_500));
    await moveDue(scope.id, -1);
    const answers = await Promise.all(Array.from({ length: 20 }, () => tabulation(scope.id)));
    expect(new Set(answers.map((answer) => answer.status))).toEqual(new Set([200]));
    expect(answers.every((answer) => (answer.body as BidTabulationView).bids.length === 2)).toBe(true);
    expect(await rowsOf(scope.id)).toHaveLength(2);
    const audit = await sql<{ detail: object }>(
      `SELECT detail FROM audit_event WHERE subject_id = $1 AND action = 'bids.opened'`,
      [scope.id],
    );
    expect(audit).toHaveLength(1);
    expect(audit[0]?.detail).toMatchObject({ mode: 'sealed', bids: 2 });
    const [sealed] = await sql<{ left: string }>(
      `SELECT count(*) AS left FROM sealed_bid WHERE scope_id = $1 AND status <> 'opened'`,
      [scope.id],
    );
    expect(sealed?.left).toBe('0');
  });

  it('happens by itself at due, without anyone asking', async () => {
    const scope = await publishScope(gc, { dueAt: new Date(Date.now() + 1_500).toISOString() });
    await placeBid(crew(0), scope.id, lumpBid(410_000));
    await waitFor(async () => (await rowsOf(scope.id)).length === 1, 10_000);
    expect(await rowsOf(scope.id)).toMatchObject([{ total_cents: '410000', status: 'opened' }]);
    const mails = await sql(
      `SELECT 1 FROM pgboss.job WHERE name = 'send_mail' AND data->>'kind' = 'bids_due' AND data->>'scopeId' = $1`,
      [scope.id],
      'super',
    );
    expect(mails).toHaveLength(1);
  });

  it('refuses before due by the clock, even when its own job comes early', async () => {
    const scope = await publishScope(gc);
    await placeBid(crew(0), scope.id, lumpBid(420_000));
    await sql(
      `UPDATE pgboss.job SET start_after = now() WHERE name = 'come_due' AND data->>'scopeId' = $1`,
      [scope.id],
      'super',
    );
    // The early job is done and has been put off to the due time that stands.
    await waitFor(async () => {
      const jobs = await sql<{ state: string; early: boolean }>(
        `SELECT state, start_after < now() + interval '1 day' AS early FROM pgboss.job
         WHERE name = 'come_due' AND data->>'scopeId' = $1`,
        [scope.id],
        'super',
      );
      const isPutOff = jobs.some((job) => job.state === 'created' && !job.early);
      return jobs.length === 2 && isPutOff;
    }, 10_000);
    expect(await rowsOf(scope.id)).toEqual([]);
    const answer = await tabulation(scope.id);
    expect(answer.body).toMatchObject({ status: 'open', count: 1, bids: [] });
  });

  it('opens nothing without the scope’s key', async () => {
    const scope = await publishScope(gc);
    await placeBid(crew(0), scope.id, lumpBid(430_000));
    await sql('UPDATE scope_key SET wrapped_private_key = $2 WHERE scope_id = $1', [
      scope.id,
      Buffer.alloc(90, 1),
    ]);
    await moveDue(scope.id, -1);
    const answer = await tabulation(scope.id);
    expect([answer.status, codeOf(answer)]).toEqual([500, 'internal']);
    expect(await rowsOf(scope.id)).toEqual([]);
    const [row] = await sql<{ status: string }>('SELECT status FROM scope WHERE id = $1', [scope.id]);
    expect(row?.status).toBe('open');
    await sql(`UPDATE scope SET status = 'withdrawn' WHERE id = $1`, [scope.id]);
  });

  it('is stopped whole by one altered bid', async () => {
    const scope = await publishScope(gc);
    await placeBid(crew(0), scope.id, lumpBid(440_000));
    await placeBid(crew(1), scope.id, lumpBid(450_000));
    const [kept] = await sql<{ ciphertext: Buffer }>(
      'SELECT ciphertext FROM sealed_bid WHERE scope_id = $1 AND company_id = $2',
      [scope.id, crew(1).id],
    );
    const altered = Buffer.from(kept?.ciphertext ?? Buffer.alloc(0));
    altered[40] = (altered[40] ?? 0) ^ 1;
    const write = (bytes: Buffer | undefined) =>
      sql('UPDATE sealed_bid SET ciphertext = $3 WHERE scope_id = $1 AND company_id = $2', [
        scope.id,
        crew(1).id,
        bytes,
      ]);
    await write(altered);
    await moveDue(scope.id, -1);
    expect((await tabulation(scope.id)).status).toBe(500);
    expect(await rowsOf(scope.id)).toEqual([]);
    await write(kept?.ciphertext);
    expect((await comeDue(gc, scope.id)).bids).toHaveLength(2);
  });

  it('takes bids around due exactly by the clock after the lock: 200 or 409, rows = 200s', async () => {
    const scope = await publishScope(gc);
    await moveDue(scope.id, 400);
    const tries = crews.flatMap((one, n) =>
      Array.from({ length: 4 }, (_, k) => async () => {
        await sleep(150 * k + n * 9);
        const answer = await one.owner.client.put(
          `/api/scopes/${scope.id}/own-bid`,
          lumpBid(500_000 + 10 * n + k),
        );
        return { crew: one.id, status: answer.status, code: answer.status === 200 ? '' : codeOf(answer) };
      }),
    );
    const answers = await Promise.all(tries.map((attempt) => attempt()));
    expect(
      answers.every(({ status, code }) => status === 200 || (status === 409 && code === 'bids_closed')),
    ).toBe(true);
    const taken = answers.filter((answer) => answer.status === 200);
    expect(taken.length).toBeGreaterThan(0);
    expect(taken.length).toBeLessThan(answers.length);
    const sealed = await sql<{ company_id: string; late: boolean }>(
      `SELECT b.company_id, b.submitted_at >= s.due_at AS late FROM sealed_bid b JOIN scope s ON s.id = b.scope_id
       WHERE b.scope_id = $1`,
      [scope.id],
    );
    expect(new Set(sealed.map((row) => row.company_id))).toEqual(new Set(taken.map((answer) => answer.crew)));
    expect(sealed.some((row) => row.late)).toBe(false);
    const revisions = await sql<{ accepted: string }>(
      `SELECT count(*) AS accepted FROM audit_event
       WHERE detail->>'scopeId' = $1 AND action IN ('bid.submitted', 'bid.revised')`,
      [scope.id],
    );
    expect(Number(revisions[0]?.accepted)).toBe(taken.length);
    const opened = (await expectStatus(tabulation(scope.id), 200)).body as BidTabulationView;
    expect(opened.bids).toHaveLength(sealed.length);
  });

  it('a bid that waited for the lock past due comes too late', async () => {
    const scope: ScopeDetailView = await publishScope(gc);
    await moveDue(scope.id, 500);
    const { Client } = await import('pg');
    const holder = new Client({ connectionString: process.env.TEST_PG_URL });
    await holder.connect();
    await holder.query('BEGIN');
    await holder.query('SELECT 1 FROM scope WHERE id = $1 FOR UPDATE', [scope.id]);
    const bid = crew(0).owner.client.put(`/api/scopes/${scope.id}/own-bid`, lumpBid(460_000));
    await sleep(900);
    await holder.query('COMMIT');
    await holder.end();
    const answer = await bid;
    expect([answer.status, codeOf(answer)]).toEqual([409, 'bids_closed']);
    expect(await sql('SELECT 1 FROM sealed_bid WHERE scope_id = $1', [scope.id])).toEqual([]);
  });
});
