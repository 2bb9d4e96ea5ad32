import { randomUUID } from 'node:crypto';
import { signUpBody, uniqueEmail } from './builders/people.ts';
import { Client } from './client.ts';
import { closeDatabase, sql } from './database.ts';
import { mailTo } from './mail.ts';

afterAll(closeDatabase);

interface FullMail {
  subject: string;
  text: string;
  html: string;
  messageId: string;
  to: string[];
}

describe('e-mail through the job runner', () => {
  it('arrives in one frame as text and HTML, with an address of this app and nothing typed as markup or header', async () => {
    const email = uniqueEmail();
    const body = signUpBody('general_contractor', email);
    const name = `Eve <b>Bold</b>`;
    const answer = await new Client().post('/api/auth/sign-up', { ...body, name });
    expect(answer.status).toBe(202);
    const mail = (await mailTo(email, /confirm/i)) as unknown as FullMail;
    expect(mail.to).toEqual([email]);
    expect(mail.text).toContain(`Hello ${name},`);
    expect(mail.text).toContain(`${process.env.BASE_URL}/verify?token=`);
    expect(mail.text).toContain('Kerfyard');
  });

  it('carries ids only in its job: no token, no address, no words', async () => {
    const email = uniqueEmail();
    await new Client().post('/api/auth/sign-up', signUpBody('cutting_contractor', email));
    await mailTo(email, /confirm/i);
    const jobs = await sql<{ data: Record<string, unknown> }>(
      `SELECT data FROM pgboss.job WHERE name = 'send_mail' AND data->>'to' IN (SELECT id::text FROM sign_up WHERE email = $1)`,
      [email],
    );
    expect(jobs).toHaveLength(1);
    const { kind, ...rest } = jobs[0]!.data;
    expect(kind).toBe('sign_up');
    for (const value of Object.values(rest)) expect(String(value)).toMatch(/^[0-9a-f-]{36}$/);
  });

  it('does not write to people who are gone', async () => {
    const email = uniqueEmail();
    const userId = randomUUID();
    await sql(
      `INSERT INTO app_user (id, email, name, password_hash, email_verified_at, deactivated_at)
       VALUES ($1, $2, 'Gone Person', 'x', app_now(), app_now())`,
      [userId, email],
    );
    const mailId = randomUUID();
    await sql(
      `INSERT INTO pgboss.job (name, data, retry_limit) VALUES ('send_mail', $1, 0)`,
      [JSON.stringify({ kind: 'message_waiting', to: userId, mailId })],
      'owner',
    );
    for (let tries = 0; ; tries += 1) {
      const [job] = await sql<{ state: string }>(`SELECT state FROM pgboss.job WHERE data->>'mailId' = $1`, [
        mailId,
      ]);
      if (job?.state === 'completed') break;
      expect(tries).toBeLessThan(100);
      await new Promise((resolve) => setTimeout(resolve, 100));
    }
    const listed = await fetch(`${process.env.MAIL_URL}/api/messages?to=${encodeURIComponent(email)}`);
    expect(((await listed.json()) as { messages: unknown[] }).messages).toEqual([]);
  });
});
