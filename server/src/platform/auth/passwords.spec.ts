import * as argon2 from '@node-rs/argon2';
import { Passwords } from './passwords.ts';

jest.mock('@node-rs/argon2', () => {
  const real = jest.requireActual<typeof argon2>('@node-rs/argon2');
  return { ...real, verify: jest.fn(real.verify) };
});
const verifications = jest.mocked(argon2.verify);

describe('D-09 passwords', () => {
  const passwords = new Passwords();

  it('cost one argon2 verification whether there is an account or not', async () => {
    const stored = await passwords.hash('a kettle on the ninth stair');
    const cases: [string | null, string, boolean][] = [
      [stored, 'a kettle on the ninth stair', true],
      [stored, 'a kettle on the tenth stair', false],
      [null, 'a kettle on the ninth stair', false],
    ];
    for (const [hash, password, isRight] of cases) {
      verifications.mockClear();
      expect(await passwords.verify(hash, password)).toBe(isRight);
      expect(verifications).toHaveBeenCalledTimes(1);
      expect(String(verifications.mock.calls[0]?.[0])).toMatch(/^\$argon2id\$v=19\$m=19456,t=2,p=1\$/);
    }
  });

  it('are salted: the same one twice gives two hashes', async () => {
    expect(await passwords.hash('a kettle on the ninth stair')).not.toBe(
      await passwords.hash('a kettle on the ninth stair'),
    );
  });
});
