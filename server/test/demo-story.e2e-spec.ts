import { fork, type ChildProcess } from 'node:child_process';
import { once } from 'node:events';
import { readFileSync } from 'node:fs';
import { join } from 'node:path';
import type { Page } from '@kerfyard/common/api';
import type { FileView } from '@kerfyard/common/files';
import type { BooksView } from '@kerfyard/common/payments';
import type { OwnScopeView, ScopeCardView, ScopeDetailView } from '@kerfyard/common/scopes';
import type { SubcontractListItem } from '@kerfyard/common/subcontracts';
import sharp from 'sharp';
import { expectStatus, signIn } from './builders/people.ts';
import type { Client } from './client.ts';
import { readPdfText } from './pdf-text.ts';

jest.setTimeout(240_000);

interface SignIn {
  role: string;
  name: string;
  email: string;
  password: string;
}

let stack: ChildProcess;
let url: string;
let signIns: SignIn[];

/** A whole Kerfyard of its own, filled as `npm start` fills an empty one. */
beforeAll(async () => {
  const program = join(__dirname, '../../scripts/stack.mjs');
  stack = fork(program, ['--seed', '--mode', 'demo'], {
    stdio: ['ignore', 'ignore', 'inherit', 'ipc'],
    execArgv: [],
  });
  const ready = once(stack, 'message') as Promise<[{ url: string; signInsFile: string }]>;
  const ended = once(stack, 'exit').then(([code]) => {
    throw new Error(`The demo ended with ${code} before it was ready.`);
  });
  const [info] = await Promise.race([ready, ended]);
  ended.catch(() => undefined);
  url = info.url;
  signIns = JSON.parse(readFileSync(info.signInsFile, 'utf8')) as SignIn[];
});
afterAll(async () => {
  if (stack.exitCode !== null || stack.signalCode !== null) return;
  stack.kill('SIGTERM');
  await once(stack, 'exit');
});

function enter(key: string): Promise<Client> {
  const person = signIns.find(({ email }) => email.startsWith(`${key}@`));
  return signIn(person?.email ?? '', person?.password, url);
}

async function read<T>(client: Client, path: string): Promise<T> {
  return (await expectStatus(client.get(path), 200)).body as T;
}

describe('the demo', () => {
  it('lets in everybody whom the README and the start command name', async () => {
    const readme = readFileSync(join(__dirname, '../../README.md'), 'utf8');
    const named = [...readme.matchAll(/`(\S+@demo\.kerfyard\.example)`/g)].map(([, email]) => email);
    expect(signIns.map(({ email }) => email).sort()).toEqual(named.sort());
    expect(readme).toContain(`\`${signIns[0]?.password}\``);
    for (const { email, password } of signIns) await signIn(email, password, url);
  });

  it('has scopes in every state, some of them open to a crew, sealed and ranked', async () => {
    const wren = await enter('wren');
    const own = await read<Page<OwnScopeView>>(wren, '/api/scopes?limit=100');
    expect(new Set(own.items.map(({ status }) => status))).toEqual(
      new Set(['draft', 'open', 'due', 'awarded']),
    );
    const open = await read<Page<ScopeCardView>>(await enter('marisol'), '/api/open-scopes?limit=100');
    expect(new Set(open.items.map(({ mode }) => mode))).toEqual(new Set(['sealed', 'ranked']));
    expect(open.items.some(({ ownBid }) => ownBid?.status === 'in')).toBe(true);
    expect(open.items.some(({ ownBid }) => ownBid === null)).toBe(true);
    expect(open.items.some(({ ownBid }) => typeof ownBid?.rank === 'number')).toBe(true);
  });

  it('has work set aside and work paid for, in books that hold', async () => {
    const work = await read<Page<SubcontractListItem>>(await enter('marisol'), '/api/subcontracts');
    const money = work.items.map((item) => item.money);
    expect(money.some((line) => line.releasedCents > 0)).toBe(true);
    expect(money.some((line) => line.setAsideCents > line.releasedCents)).toBe(true);
    const books = await read<BooksView>(await enter('staff'), '/api/staff/books');
    expect(books.checks.filter(({ failures }) => failures > 0)).toEqual([]);
    expect(books.incidents).toEqual([]);
    expect(books.operations.filter(({ status }) => status !== 'succeeded')).toEqual([]);
  });

  it('hangs drawings with text to select and real pictures on a scope', async () => {
    const marisol = await enter('marisol');
    const { items } = await read<Page<ScopeCardView>>(marisol, '/api/open-scopes?limit=100');
    const [files, cuts] = await filesOf(marisol, items);
    const drawings = files.filter(({ kind }) => kind === 'drawing');
    const photos = files.filter(({ kind }) => kind === 'photo');
    expect(drawings.length).toBeGreaterThanOrEqual(items.length);
    expect(photos.length).toBeGreaterThanOrEqual(items.length);
    expect(cuts).toBeGreaterThan(items.length);
    for (const { id } of drawings) {
      const [text] = await readPdfText(await download(marisol, id));
      expect(text).toMatch(/\d+'|\d+"| ft\b| in\b/);
    }
    // A flat box has one colour; a picture of a place has many shades of each.
    for (const { id } of photos) {
      const { channels } = await sharp(await download(marisol, id)).stats();
      for (const { stdev } of channels) expect(stdev).toBeGreaterThan(15);
    }
  });
});

async function filesOf(client: Client, scopes: readonly ScopeCardView[]): Promise<[FileView[], number]> {
  const details: ScopeDetailView[] = [];
  for (const { id } of scopes) details.push(await read<ScopeDetailView>(client, `/api/scopes/${id}`));
  const cuts = details.reduce((sum, { body }) => sum + (body?.cuts.length ?? 0), 0);
  return [details.flatMap(({ files }) => files), cuts];
}

async function download(client: Client, id: string): Promise<Buffer> {
  const { body } = await expectStatus(client.prepare('get', `/api/files/${id}`).responseType('blob'), 200);
  return body as Buffer;
}
