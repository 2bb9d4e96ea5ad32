import { mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { createTransport } from 'nodemailer';
import { startMailStandIn } from './mail-stand-in.ts';
import type { MailStandIn } from './mail-stand-in.ts';
import { MailStore } from './mail-store.ts';

interface Listed {
  id: string;
  to: string[];
  subject: string;
  text: string;
  links: string[];
  attachments: { filename: string; contentType: string; sizeBytes: number }[];
}

describe('mail stand-in', () => {
  const dataDir = mkdtempSync(join(tmpdir(), 'mail-stand-in-'));
  let standIn: MailStandIn;

  const start = async () => {
    standIn = await startMailStandIn({ host: 'localhost', smtpPort: 0, webPort: 0, dataDir });
  };
  const list = async (query = ''): Promise<Listed[]> => {
    const response = await fetch(`${standIn.webUrl}/api/messages${query}`);
    return ((await response.json()) as { messages: Listed[] }).messages;
  };
  const send = (message: object) =>
    createTransport({ host: 'localhost', port: standIn.smtpPort, secure: false }).sendMail({
      from: 'Kerfyard <no-reply@kerfyard.test>',
      subject: 'Confirm your address',
      text: 'Open http://127.0.0.1:3000/verify?token=abc&x=1.',
      ...message,
    });

  beforeAll(start);
  afterAll(async () => {
    await standIn.close();
    rmSync(dataDir, { recursive: true, force: true });
  });
  beforeEach(async () => {
    await fetch(`${standIn.webUrl}/api/messages`, { method: 'DELETE' });
  });

  test('keeps a message with text, HTML, links and attachments; finds it by recipient', async () => {
    await send({
      to: 'Ada <Ada@harrow.test>',
      bcc: 'hidden@harrow.test',
      html: '<p>Open <a href="http://127.0.0.1:3000/verify?token=abc&amp;x=1">this</a></p>',
      attachments: [{ filename: 'statement.pdf', content: 'pdf', contentType: 'application/pdf' }],
    });
    await send({ to: 'bo@quarry.test', subject: 'Another' });
    const [message, ...others] = await list('?to=ada@harrow.test');
    expect(others).toEqual([]);
    expect(message).toMatchObject({
      to: ['ada@harrow.test', 'hidden@harrow.test'],
      subject: 'Confirm your address',
      links: ['http://127.0.0.1:3000/verify?token=abc&x=1'],
      attachments: [{ filename: 'statement.pdf', contentType: 'application/pdf', sizeBytes: 3 }],
    });
    expect((await list()).map(({ subject }) => subject)).toEqual(['Another', 'Confirm your address']);
    const file = await fetch(`${standIn.webUrl}/messages/${message!.id}/attachments/0`);
    expect(file.headers.get('content-disposition')).toContain('attachment');
    expect(await file.text()).toBe('pdf');
  });

  test('the page shows list and message; foreign HTML stays in a sandbox', async () => {
    await send({
      to: 'ada@harrow.test',
      subject: '<b>Sign</b>',
      html: '<script>alert(1)</script><p>Hello</p>',
    });
    const [message] = await list();
    const page = await (await fetch(`${standIn.webUrl}/`)).text();
    expect(page).toContain('Mail for this machine');
    expect(page).toContain('&lt;b&gt;Sign&lt;/b&gt;');
    const shown = await (await fetch(`${standIn.webUrl}/messages/${message!.id}`)).text();
    expect(shown).toContain('sandbox="allow-scripts allow-popups allow-popups-to-escape-sandbox"');
    expect(shown).toContain('<a href="http://127.0.0.1:3000/verify?token=abc&amp;x=1">');
    expect(shown).not.toContain('<script');
    const raw = await fetch(`${standIn.webUrl}/messages/${message!.id}/html`);
    expect(raw.headers.get('content-security-policy')).toMatch(/^sandbox .*default-src 'none'/);
  });

  test('deletes one and all', async () => {
    await send({ to: 'ada@harrow.test' });
    await send({ to: 'bo@quarry.test' });
    const [message] = await list('?to=bo@quarry.test');
    const gone = await fetch(`${standIn.webUrl}/api/messages/${message!.id}`, { method: 'DELETE' });
    expect(gone.status).toBe(200);
    expect((await fetch(`${standIn.webUrl}/api/messages/${message!.id}`)).status).toBe(404);
    expect(await list()).toHaveLength(1);
    await fetch(`${standIn.webUrl}/clear`, { method: 'POST', redirect: 'manual' });
    expect(await list()).toEqual([]);
  });

  test('a restart keeps the mail', async () => {
    await send({ to: 'ada@harrow.test', subject: 'Before' });
    await standIn.close();
    await start();
    expect((await list()).map(({ subject }) => subject)).toEqual(['Before']);
  });

  test('a port in use is an error and leaves nothing running', async () => {
    const webPort = Number(new URL(standIn.webUrl).port);
    await expect(startMailStandIn({ host: 'localhost', smtpPort: 0, webPort, dataDir })).rejects.toThrow(
      'EADDRINUSE',
    );
    const { smtpPort } = standIn;
    await expect(startMailStandIn({ host: 'localhost', smtpPort, webPort: 0, dataDir })).rejects.toThrow(
      'EADDRINUSE',
    );
  });

  test('the oldest go when there are too many', () => {
    const directory = mkdtempSync(join(tmpdir(), 'mail-store-'));
    const store = new MailStore(directory, 3);
    const message = { receivedAt: '', from: '', to: ['a'], text: '', html: null, links: [], attachments: [] };
    for (const subject of ['1', '2', '3', '4', '5']) store.add({ ...message, subject });
    const reopened = new MailStore(directory, 3);
    expect(reopened.list().map(({ subject }) => subject)).toEqual(['5', '4', '3']);
    rmSync(directory, { recursive: true });
  });
});
