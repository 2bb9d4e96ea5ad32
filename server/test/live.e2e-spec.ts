import { randomUUID } from 'node:crypto';
import { makeCuttingContractor, makeGeneralContractor, type Company } from './builders/people.ts';
import { Client } from './client.ts';
import { closeDatabase, sql } from './database.ts';
import { openLine } from './live.ts';
import { startSecondServer } from './second-server.ts';
import { waitFor } from './wait.ts';

/** What the server promises: SESSION_CHECK_MS and some. */
const DROPPED_WITHIN_MS = 8_000;

let gc: Company;
let crew: Company;

beforeAll(async () => {
  gc = await makeGeneralContractor();
  crew = await makeCuttingContractor();
});
afterAll(closeDatabase);

const sessionOf = (client: Client) => client.cookie('refresh')?.split('.')[0] ?? '';

describe('D-14 sockets', () => {
  it('open for our own pages alone', async () => {
    const { client } = gc.owner;
    for (const origin of [
      'https://evil.example',
      'null',
      `${client.url}.evil.example`,
      'http://127.0.0.1:1',
      '',
    ]) {
      await expect(openLine(client, { Origin: origin })).rejects.toThrow();
    }
    (await openLine(client)).close();
  });

  it('open for people with a session alone', async () => {
    await expect(openLine(new Client())).rejects.toThrow('unauthenticated');
    const forged = new Client();
    forged.setCookie('access', 'e30.e30.x');
    await expect(openLine(forged)).rejects.toThrow('unauthenticated');
  });

  it('answer the same for what is unknown, foreign or unreadable', async () => {
    const line = await openLine(crew.owner.client);
    const watches: unknown[] = [
      { topic: 'scope', id: randomUUID() },
      { topic: 'subcontract', id: randomUUID() },
      { topic: 'thread', id: randomUUID() },
      { topic: 'company', id: gc.id },
      { topic: 'user', id: gc.owner.userId },
      { topic: 'scope', id: "' OR 1=1" },
      { topic: 'scope', id: randomUUID(), extra: 1 },
      { topic: 'scope', id: { $ne: '' } },
      null,
      'crews',
      [],
    ];
    for (const watch of watches) expect(await line.watch(watch as never)).toBe(false);
    line.close();
  });

  it('are cut when they send too much at once or too many messages', async () => {
    const large = await openLine(crew.owner.client);
    const isLargeCut = new Promise((resolve) => large.socket.once('disconnect', resolve));
    large.socket.emit('watch', { topic: 'scope', id: 'x'.repeat(70_000) } as never, () => undefined);
    await isLargeCut;

    const flood = await openLine(crew.owner.client);
    const isFloodCut = new Promise((resolve) => flood.socket.once('disconnect', resolve));
    for (let n = 0; n < 200; n += 1) flood.socket.emit('unwatch', { topic: 'scope', id: randomUUID() });
    await isFloodCut;
    (await openLine(crew.owner.client)).close();
  });

  it('close soon after the session runs out, is ended on another server, or the person is deactivated', async () => {
    const [ranOut, deactivated, elsewhere, kept] = await Promise.all([
      makeGeneralContractor(),
      makeGeneralContractor(),
      makeGeneralContractor(),
      makeGeneralContractor(),
    ]);
    const open = async (company: Company) => {
      const line = await openLine(company.owner.client);
      const state = { isEnded: false, isClosed: false };
      line.socket.once('session_ended', () => (state.isEnded = true));
      line.socket.once('disconnect', () => (state.isClosed = true));
      return { line, state };
    };
    const lines = await Promise.all([ranOut, deactivated, elsewhere, kept].map(open));
    await sql(`UPDATE session SET expires_at = now() - interval '1 second' WHERE id = $1`, [
      sessionOf(ranOut.owner.client),
    ]);
    await sql('UPDATE app_user SET deactivated_at = now() WHERE id = $1', [deactivated.owner.userId]);
    const other = await startSecondServer();
    try {
      const there = new Client(other.url);
      for (const kind of ['access', 'refresh'] as const)
        there.setCookie(kind, elsewhere.owner.client.cookie(kind) ?? '');
      expect((await there.post('/api/auth/sign-out')).status).toBe(204);
      const dropped = lines.slice(0, 3);
      await waitFor(() => dropped.every(({ state }) => state.isEnded && state.isClosed), DROPPED_WITHIN_MS);
      expect(lines[3]?.state).toEqual({ isEnded: false, isClosed: false });
    } finally {
      for (const { line } of lines) line.close();
      await other.stop();
    }
  });
});
