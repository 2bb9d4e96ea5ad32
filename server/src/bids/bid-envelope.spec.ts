import { KeyVault } from '../platform/crypto/key-vault.ts';
import { newKey } from '../platform/crypto/sealing.ts';
import type { Config } from '../platform/config/config.ts';
import { scopeKeyContext } from '../scopes/scope-key-context.ts';
import { openBid, readDraft, readOwnBid, sealBid, sealDraft, type BidContent } from './bid-envelope.ts';
import { newScopeKeyPair } from './scope-keys.ts';

const identity = { bidId: 'bid-1', scopeId: 'scope-1', companyId: 'company-1' };
const contentOf = (lumpCents: number): BidContent => ({
  input: {
    revision: 1,
    price: { form: 'lump', lumpCents },
    answers: [],
    inclusions: [],
    exclusions: [],
    note: '',
    validDays: 30,
    startFrom: null,
  },
  priced: {
    totalCents: lumpCents,
    lines: [],
    computedCents: lumpCents,
    minimumCents: 0,
    minimumApplied: false,
    mobilizationCents: 0,
  },
});

describe('a sealed bid', () => {
  const pair = newScopeKeyPair();
  const companyKey = newKey();
  const keys = { scopePublicKey: pair.publicKey, companyKey };
  const sealed = sealBid(contentOf(739_184_627), identity, keys);

  it('opens with the scope’s private key, and for its bidder with the company’s key', () => {
    expect(openBid(sealed, identity, pair)).toEqual(contentOf(739_184_627));
    expect(readOwnBid(sealed, identity, companyKey)).toEqual(contentOf(739_184_627));
  });

  it('opens with no other scope’s key and no other company’s key', () => {
    expect(() => openBid(sealed, identity, newScopeKeyPair())).toThrow();
    expect(() => openBid(sealed, identity, { ...newScopeKeyPair(), publicKey: pair.publicKey })).toThrow();
    expect(() => readOwnBid(sealed, identity, newKey())).toThrow();
  });

  it('stays shut without the master key that wraps the scope’s private half', () => {
    const vault = () => new KeyVault({ masterKey: newKey() } as Config);
    const right = vault();
    const wrapped = right.wrapKey(pair.privateKey, scopeKeyContext('scope-1'));
    const unwrapped = right.unwrapKey(wrapped, scopeKeyContext('scope-1'));
    expect(openBid(sealed, identity, { ...pair, privateKey: unwrapped })).toEqual(contentOf(739_184_627));
    expect(() => vault().unwrapKey(wrapped, scopeKeyContext('scope-1'))).toThrow();
    expect(() => right.unwrapKey(wrapped, scopeKeyContext('scope-2'))).toThrow();
  });

  it('cannot pose as another bid, another company’s or another scope’s', () => {
    for (const other of [{ bidId: 'bid-2' }, { scopeId: 'scope-2' }, { companyId: 'company-2' }]) {
      expect(() => openBid(sealed, { ...identity, ...other }, pair)).toThrow();
      expect(() => readOwnBid(sealed, { ...identity, ...other }, companyKey)).toThrow();
    }
  });

  it('opens no more once a single bit was changed, anywhere', () => {
    for (const part of ['ciphertext', 'keyForScope'] as const) {
      for (const place of [0, 20, Math.floor(sealed[part].length / 2), sealed[part].length - 1]) {
        const bytes = Buffer.from(sealed[part]);
        bytes[place] = (bytes[place] ?? 0) ^ 1;
        expect(() => openBid({ ...sealed, [part]: bytes }, identity, pair)).toThrow();
      }
    }
  });

  it('is as long for a small amount as for a large one', () => {
    const small = sealBid(contentOf(100), identity, keys);
    expect(small.ciphertext.length).toBe(sealed.ciphertext.length);
    expect(small.ciphertext.equals(sealed.ciphertext)).toBe(false);
  });

  it('keeps a draft for its company alone', () => {
    const draft = sealDraft({ lump: '7,391,846.27' }, identity, companyKey);
    expect(readDraft(draft, identity, companyKey)).toEqual({ lump: '7,391,846.27' });
    expect(() => readDraft(draft, identity, newKey())).toThrow();
    expect(() => readDraft(draft, { ...identity, scopeId: 'scope-2' }, companyKey)).toThrow();
  });
});
