import { randomUUID } from 'node:crypto';
import type { Page } from '@kerfyard/common/api';
import type { ThreadView } from '@kerfyard/common/talk';
import { expectStatus, makeCuttingContractor, makeGeneralContractor, signIn } from './builders/people.ts';
import { lumpBid, placeBid, publishScope } from './builders/scopes.ts';
import type { Client } from './client.ts';
import { closeDatabase } from './database.ts';
import { startQueryCounter } from './query-counter.ts';
import { startSecondServer } from './second-server.ts';

jest.setTimeout(180_000);
afterAll(closeDatabase);

const ROWS = 25;

type Query = Record<string, string | number>;

/** Statements that each list costs for one row and for twenty-five. */
async function countLists(
  email: string,
  lists: readonly { path: string; one: Query; many: Query }[],
): Promise<{ path: string; one: number; many: number }[]> {
  const counter = await startQueryCounter(process.env.TEST_PG_URL ?? '');
  const server = await startSecondServer({ DATABASE_URL: counter.url, RATE_LIMIT_FACTOR: '1000' });
  const cost = async (client: Client, path: string, query: Query, rows: number) => {
    const costs: number[] = [];
    for (let run = 0; run < 5; run += 1) {
      const before = counter.count('kerfyard-app');
      const { body } = await expectStatus(client.get(path, { query }), 200);
      const items = Array.isArray(body) ? (body as unknown[]) : (body as Page<unknown>).items;
      expect(items).toHaveLength(rows);
      costs.push(counter.count('kerfyard-app') - before);
    }
    // The least: a timed job of the same server may fall into one of them.
    return Math.min(...costs);
  };
  try {
    const client = await signIn(email, undefined, server.url);
    const counted = [];
    for (const { path, one, many } of lists) {
      counted.push({
        path,
        one: await cost(client, path, one, 1),
        many: await cost(client, path, many, ROWS),
      });
    }
    return counted;
  } finally {
    await server.stop();
    await counter.close();
  }
}

describe('a list of twenty-five costs as many statements as a list of one', () => {
  it('own scopes, own bids, threads and messages', async () => {
    const [gc, crew] = await Promise.all([makeGeneralContractor(), makeCuttingContractor()]);
    const threadIds: string[] = [];
    for (let n = 0; n < ROWS; n += 1) {
      const scope = await publishScope(gc, { mode: n % 2 === 0 ? 'sealed' : 'ranked' });
      await placeBid(crew, scope.id, lumpBid(500_000 + n));
      const { client } = crew.owner;
      const thread = (await client.post(`/api/scopes/${scope.id}/threads`, {})).body as ThreadView;
      threadIds.push(thread.id);
      const message = { id: randomUUID(), body: 'Gate 2 or gate 3?', fileIds: [] };
      await expectStatus(client.post(`/api/threads/${thread.id}/messages`, message), 201);
    }
    const talkative = `/api/threads/${threadIds[0]}/messages`;
    for (let n = 1; n < ROWS; n += 1) {
      const message = { id: randomUUID(), body: `Message ${n}`, fileIds: [] };
      await expectStatus(crew.owner.client.post(talkative, message), 201);
    }
    const pages = { one: { limit: 1 }, many: { limit: ROWS } };
    const ofGc = await countLists(gc.owner.email, [
      { path: '/api/scopes', ...pages },
      { path: '/api/threads', ...pages },
      { path: talkative, ...pages },
    ]);
    const ofCrew = await countLists(crew.owner.email, [{ path: '/api/bids', ...pages }]);
    for (const { path, one, many } of [...ofGc, ...ofCrew]) {
      expect({ path, statements: many }).toEqual({ path, statements: one });
      // The session's check, and a few of the list's own.
      expect(many).toBeLessThanOrEqual(8);
    }
  });
});
