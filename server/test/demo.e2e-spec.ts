import { execFile } from 'node:child_process';
import { join } from 'node:path';
import {
  addStaff,
  makeCuttingContractor,
  makeGeneralContractor,
  PASSWORD,
  signIn,
  uniqueEmail,
} from './builders/people.ts';
import { Client } from './client.ts';
import { closeDatabase, sql } from './database.ts';
import { secondServerSettings, startSecondServer } from './second-server.ts';

afterAll(closeDatabase);

/** A server in this mode while `work` runs. */
async function inMode<T>(mode: string, work: (client: Client) => Promise<T>) {
  const server = await startSecondServer({ KERFYARD_MODE: mode, RATE_LIMIT_FACTOR: '1000' });
  try {
    return await work(new Client(server.url));
  } finally {
    await server.stop();
  }
}

describe('the demo’s people', () => {
  it('can be entered with one press in the demo, by key, and not in test or production', async () => {
    const [gc, crew] = await Promise.all([makeGeneralContractor(), makeCuttingContractor()]);
    const staff = await addStaff(gc);
    const people = [gc.owner, crew.owner, staff];
    await Promise.all(
      people.map(({ userId }, position) =>
        sql(
          'INSERT INTO demo_person (key, user_id, position) VALUES ($1, $2, $3)',
          [`demo-${position}-${userId}`, userId, position],
          'owner',
        ),
      ),
    );
    const keys = people.map(({ userId }, position) => `demo-${position}-${userId}`);
    try {
      const enter = (mode: string) =>
        inMode(mode, async (client) => {
          const listed = (await client.get('/api/demo/people')).body.filter(({ key }: { key: string }) =>
            keys.includes(key),
          );
          expect(listed).toEqual([
            {
              key: keys[0],
              name: gc.owner.name,
              company: gc.name,
              kind: 'general_contractor',
              role: 'owner',
            },
            {
              key: keys[1],
              name: crew.owner.name,
              company: crew.name,
              kind: 'cutting_contractor',
              role: 'owner',
            },
            { key: keys[2], name: staff.name, company: null, kind: 'staff', role: 'staff' },
          ]);
          const entered = await client.post('/api/demo/sign-in', { key: keys[1] });
          expect([entered.status, entered.body.company]).toEqual([
            200,
            { id: crew.id, kind: crew.kind, name: crew.name },
          ]);
          expect((await client.get('/api/auth/me')).body.user.id).toBe(crew.owner.userId);
          expect((await client.post('/api/demo/sign-in', { key: 'nobody' })).status).toBe(404);
          expect((await client.post('/api/demo/sign-in', { key: keys[0], userId: 'x' })).status).toBe(422);
        });
      const closed = async (client: Client) => {
        const listed = await client.get('/api/demo/people');
        expect([listed.status, listed.body]).toEqual([200, []]);
        const answer = await client.post('/api/demo/sign-in', { key: keys[0] });
        expect([answer.status, answer.headers['set-cookie']]).toEqual([404, undefined]);
      };
      await Promise.all([enter('demo'), closed(new Client()), inMode('production', closed)]);
    } finally {
      await sql('DELETE FROM demo_person WHERE key = ANY($1)', [keys], 'owner');
    }
  }, 60_000);

  it('are chosen by the seeder alone: the app’s role may not add one', async () => {
    const { owner } = await makeGeneralContractor();
    const insert = sql(`INSERT INTO demo_person (key, user_id, position) VALUES ('mine', $1, 1)`, [
      owner.userId,
    ]);
    await expect(insert).rejects.toThrow('permission denied');
  });
});

describe('the staff program', () => {
  const run = (...args: string[]) =>
    new Promise<{ code: number; output: string }>((resolve) => {
      const program = join(__dirname, '../dist/staff.js');
      const env = secondServerSettings(1, 'http://127.0.0.1:1');
      execFile(process.execPath, [program, ...args], { env }, (error, stdout, stderr) =>
        resolve({ code: error === null ? 0 : Number(error.code), output: stdout + stderr }),
      );
    });

  it('makes a staff person with a password shown once', async () => {
    const email = uniqueEmail();
    const made = await run('--email', email, '--name', 'Ida Marsh');
    const [, password] = /shown this once: (\S+)/.exec(made.output) ?? [];
    expect([made.code, password?.length]).toEqual([0, 20]);
    const client = await signIn(email, password);
    expect((await client.get('/api/auth/me')).body).toMatchObject({ user: { isStaff: true }, company: null });
    expect((await client.get('/api/staff/books')).status).toBe(200);
    expect((await client.get('/api/scopes')).status).toBe(403);

    const again = await run('--email', email, '--name', 'Ida Marsh');
    expect([again.code, again.output]).toEqual([1, expect.stringContaining('has an account already')]);
  });

  it('takes a password, and says what is wrong with its options', async () => {
    const email = uniqueEmail();
    const made = await run('--email', email, '--name', 'Ida Marsh', '--password', PASSWORD);
    expect([made.code, made.output.includes('Password')]).toEqual([0, false]);
    await signIn(email);
    const wrong = await run('--email', 'nobody', '--password', 'short');
    expect(wrong.code).toBe(1);
    for (const option of ['--email', '--name', '--password']) expect(wrong.output).toContain(`${option}:`);
  });
});
