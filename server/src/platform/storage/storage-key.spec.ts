import fc from 'fast-check';
import { sep } from 'node:path';
import { storageKey } from './storage-key.ts';

describe('storage keys (D-47)', () => {
  it('fans out by the first four digits', () => {
    const hash = 'abcd'.padEnd(64, '0');
    expect(storageKey(hash).split(sep)).toEqual(['ab', 'cd', hash]);
  });

  it('takes nothing but a hash', () => {
    const hostile = [
      '',
      '..',
      '../../etc/passwd',
      'a'.repeat(63),
      'A'.repeat(64),
      `${'a'.repeat(63)}/`,
      `${'a'.repeat(64)}\n`,
    ];
    for (const text of hostile) expect(() => storageKey(text)).toThrow();
    fc.assert(
      fc.property(fc.string({ maxLength: 80 }), (text) => {
        fc.pre(!/^[0-9a-f]{64}$/.test(text));
        expect(() => storageKey(text)).toThrow();
      }),
    );
  });
});
