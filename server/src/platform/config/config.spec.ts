import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { readConfig } from './config.ts';

let folder: string;
let environment: Record<string, string>;

beforeAll(() => {
  folder = mkdtempSync(join(tmpdir(), 'kerfyard-config-'));
  const keyFile = join(folder, 'master.key');
  writeFileSync(keyFile, Buffer.alloc(32, 7).toString('base64'));
  writeFileSync(join(folder, 'short.key'), Buffer.alloc(16, 7).toString('base64'));
  environment = {
    KERFYARD_MODE: 'production',
    PORT: '3000',
    APP_URL: 'https://app.kerfyard.example/',
    DATABASE_URL: 'postgres://app@localhost/kerfyard',
    KERFYARD_MASTER_KEY_FILE: keyFile,
    KERFYARD_SIGNING_SECRET: '0123456789abcdef0123456789abcdef',
    FILES_DIR: folder,
    STRIPE_SECRET_KEY: 'sk_live_0123456789',
    STRIPE_WEBHOOK_SECRET: 'whsec_1',
    STRIPE_CONNECT_WEBHOOK_SECRET: 'whsec_2',
    SMTP_URL: 'smtp://localhost:25',
    MAIL_FROM: 'Kerfyard <no-reply@kerfyard.example>',
  };
});
afterAll(() => rmSync(folder, { recursive: true }));

describe('D-30 settings', () => {
  it('are read whole, with nothing trusted or loosened by default', () => {
    expect(readConfig(environment)).toMatchObject({
      mode: 'production',
      appUrl: 'https://app.kerfyard.example',
      trustProxy: 0,
      rateLimitFactor: 1,
      drainMs: 0,
      secondFactor: 'money',
      clientDist: null,
    });
  });

  it('D-18 demand a second factor of those who move money in production, elsewhere only when told', () => {
    const secondFactor = (over: object) => readConfig({ ...environment, ...over }).secondFactor;
    expect(secondFactor({ SECOND_FACTOR: 'optional' })).toBe('optional');
    const demo = { KERFYARD_MODE: 'demo', STRIPE_SECRET_KEY: 'sk_test_0123456789' };
    expect(secondFactor(demo)).toBe('optional');
    expect(secondFactor({ ...demo, SECOND_FACTOR: 'money' })).toBe('money');
  });

  it('are refused when missing, all of them at once', () => {
    const names = Object.keys(environment);
    let message = '';
    try {
      readConfig({});
    } catch (error) {
      message = String(error);
    }
    for (const name of names) expect(message).toContain(name);
  });

  it.each([
    ['a live key with a stand-in', { STRIPE_API_URL: 'http://localhost:4000' }, 'STRIPE_SECRET_KEY'],
    ['a test key in production', { STRIPE_SECRET_KEY: 'sk_test_0123456789' }, 'STRIPE_SECRET_KEY'],
    ['a weak signing secret', { KERFYARD_SIGNING_SECRET: 'a'.repeat(40) }, 'KERFYARD_SIGNING_SECRET'],
    ['a short signing secret', { KERFYARD_SIGNING_SECRET: 'short' }, 'KERFYARD_SIGNING_SECRET'],
    ['no master key', { KERFYARD_MASTER_KEY_FILE: '/nowhere/master.key' }, 'KERFYARD_MASTER_KEY_FILE'],
    ['an unknown mode', { KERFYARD_MODE: 'staging' }, 'KERFYARD_MODE'],
    ['a port that is none', { PORT: '70000' }, 'PORT'],
  ])('refuse %s', (_, change, name) => {
    expect(() => readConfig({ ...environment, ...change })).toThrow(name);
  });

  it('refuse a master key of the wrong length', () => {
    const file = join(folder, 'short.key');
    expect(() => readConfig({ ...environment, KERFYARD_MASTER_KEY_FILE: file })).toThrow('32 bytes');
  });
});
