import { deriveKey, newKey, openBytes, sealBytes } from './sealing.ts';

const plain = Buffer.from('{"lumpCents":7654321}');

describe('sealing', () => {
  it('opens with the same key and context alone', () => {
    const key = newKey();
    const sealed = sealBytes(key, plain, 'company:a');
    expect(openBytes(key, sealed, 'company:a')).toEqual(plain);
    expect(() => openBytes(newKey(), sealed, 'company:a')).toThrow();
    expect(() => openBytes(key, sealed, 'company:b')).toThrow();
  });

  it('hides the text and never gives the same bytes twice', () => {
    const key = newKey();
    const [one, two] = [sealBytes(key, plain, 'x'), sealBytes(key, plain, 'x')];
    expect(one.equals(two)).toBe(false);
    expect(one.includes(Buffer.from('7654321'))).toBe(false);
  });

  it('notices each changed bit and each cut', () => {
    const key = newKey();
    const sealed = sealBytes(key, plain, 'x');
    for (let byte = 0; byte < sealed.length; byte += 1) {
      const changed = Buffer.from(sealed);
      changed[byte] = (changed[byte] ?? 0) ^ 1;
      expect(() => openBytes(key, changed, 'x')).toThrow();
      expect(() => openBytes(key, sealed.subarray(0, byte), 'x')).toThrow();
    }
  });

  it('derives a key per purpose, the one RFC 5869 gives', () => {
    expect(deriveKey('secret', 'a')).not.toEqual(deriveKey('secret', 'b'));
    // RFC 5869, test case 3 (SHA-256, no salt, no info), its first 32 bytes.
    const key = deriveKey(Buffer.alloc(22, 0x0b), '');
    expect(key.toString('hex')).toBe('8da4e775a563c18f715f802a063c5a31b8a11f5c5ee1879ec3454e5f3c738d2d');
  });
});
