import { matchingStep, stepAt, toBase32, totpAddress, totpCode } from './totp.ts';

// RFC 6238, appendix B: the SHA-1 rows (https://www.rfc-editor.org/rfc/rfc6238#appendix-B).
const secret = Buffer.from('12345678901234567890', 'ascii');
const vectors: [number, string][] = [
  [59, '94287082'],
  [1_111_111_109, '07081804'],
  [1_111_111_111, '14050471'],
  [1_234_567_890, '89005924'],
  [2_000_000_000, '69279037'],
  [20_000_000_000, '65353130'],
];

// RFC 4226, appendix D: six digits, counters 0 to 9 (https://www.rfc-editor.org/rfc/rfc4226#appendix-D).
const counted = [
  '755224',
  '287082',
  '359152',
  '969429',
  '338314',
  '254676',
  '287922',
  '162583',
  '399871',
  '520489',
];

// RFC 4648, 10: test vectors without their padding (https://www.rfc-editor.org/rfc/rfc4648#section-10).
const base32: [string, string][] = [
  ['', ''],
  ['f', 'MY'],
  ['fo', 'MZXQ'],
  ['foo', 'MZXW6'],
  ['foob', 'MZXW6YQ'],
  ['fooba', 'MZXW6YTB'],
  ['foobar', 'MZXW6YTBOI'],
];

describe('time-based codes', () => {
  it.each(vectors)('at %d s reads as RFC 6238 says', (seconds, code) => {
    expect(totpCode(secret, stepAt(seconds * 1_000), 8)).toBe(code);
  });

  it('in six digits read as RFC 4226 says', () => {
    expect(counted.map((_, counter) => totpCode(secret, counter))).toEqual(counted);
  });

  it('fit one step before and after now, and no further', () => {
    const now = 1_234_567_890_000;
    const step = stepAt(now);
    const fits = [-2, -1, 0, 1, 2].map((away) => matchingStep(secret, totpCode(secret, step + away), now));
    expect(fits).toEqual([null, step - 1, step, step + 1, null]);
    expect(matchingStep(secret, '12345', now)).toBeNull();
    expect(matchingStep(secret, '', now)).toBeNull();
  });

  it.each(base32)('%j in base32 reads as RFC 4648 says', (text, expected) => {
    expect(toBase32(Buffer.from(text))).toBe(expected);
  });

  it('come with an address for the app, the account escaped', () => {
    const address = new URL(totpAddress(secret, 'ada+x@northpier.example'));
    expect(address.protocol).toBe('otpauth:');
    expect(address.href).toContain('Kerfyard:ada%2Bx%40northpier.example');
    expect(address.searchParams.get('secret')).toBe('GEZDGNBVGY3TQOJQGEZDGNBVGY3TQOJQ');
    expect(address.searchParams.get('issuer')).toBe('Kerfyard');
  });
});
