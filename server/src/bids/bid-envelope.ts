import type { BidInput, PricedBid } from '@kerfyard/common/bids';
import { newKey, openBytes, sealBytes } from '../platform/crypto/sealing.ts';
import { openFromScope, sealToScope, type ScopeKeyPair } from './scope-keys.ts';

/** What a sealed bid says. */
export interface BidContent {
  input: BidInput;
  priced: PricedBid;
}

/** Whose bid it is: bound to every part of the envelope, so that no row can pose as another. */
export interface BidIdentity {
  bidId: string;
  scopeId: string;
  companyId: string;
}

/** A bid as it lies in the database until due. */
export interface SealedBid {
  ciphertext: Buffer;
  keyForScope: Buffer;
  keyForBidder: Buffer;
}

/** The length of a ciphertext says how long the text is; in steps this coarse it does not say how many digits. */
const PADDING_BYTES = 1024;

/** Seal a bid: its own data key, wrapped once for the scope (the opening) and once for the bidder (reading back). */
export function sealBid(
  content: BidContent,
  identity: BidIdentity,
  keys: { scopePublicKey: Buffer; companyKey: Buffer },
): SealedBid {
  const dataKey = newKey();
  return {
    ciphertext: sealBytes(dataKey, toPadded(content), contextOf('bid', identity)),
    keyForScope: sealToScope(keys.scopePublicKey, dataKey, contextOf('bid-key-scope', identity)),
    keyForBidder: sealBytes(keys.companyKey, dataKey, contextOf('bid-key-bidder', identity)),
  };
}

/** Open a bid with the scope's private key. @throws Error when the key is another one or a byte was altered */
export function openBid(
  sealed: Pick<SealedBid, 'ciphertext' | 'keyForScope'>,
  identity: BidIdentity,
  pair: ScopeKeyPair,
): BidContent {
  const dataKey = openFromScope(pair, sealed.keyForScope, contextOf('bid-key-scope', identity));
  return fromPadded(openBytes(dataKey, sealed.ciphertext, contextOf('bid', identity))) as BidContent;
}

/** The bidder reads its own bid back. @throws Error when the key is another one or a byte was altered */
export function readOwnBid(
  sealed: Pick<SealedBid, 'ciphertext' | 'keyForBidder'>,
  identity: BidIdentity,
  companyKey: Buffer,
): BidContent {
  const dataKey = openBytes(companyKey, sealed.keyForBidder, contextOf('bid-key-bidder', identity));
  return fromPadded(openBytes(dataKey, sealed.ciphertext, contextOf('bid', identity))) as BidContent;
}

type DraftIdentity = Omit<BidIdentity, 'bidId'>;

/** Seal a bid's draft for the bidder alone. */
export function sealDraft(
  draft: Record<string, unknown>,
  identity: DraftIdentity,
  companyKey: Buffer,
): Pick<SealedBid, 'ciphertext' | 'keyForBidder'> {
  const dataKey = newKey();
  const whose = { bidId: 'draft', ...identity };
  return {
    ciphertext: sealBytes(dataKey, toPadded(draft), contextOf('bid-draft', whose)),
    keyForBidder: sealBytes(companyKey, dataKey, contextOf('bid-draft-key', whose)),
  };
}

/** The reverse of `sealDraft`. */
export function readDraft(
  sealed: Pick<SealedBid, 'ciphertext' | 'keyForBidder'>,
  identity: DraftIdentity,
  companyKey: Buffer,
): Record<string, unknown> {
  const whose = { bidId: 'draft', ...identity };
  const dataKey = openBytes(companyKey, sealed.keyForBidder, contextOf('bid-draft-key', whose));
  const opened = openBytes(dataKey, sealed.ciphertext, contextOf('bid-draft', whose));
  return fromPadded(opened) as Record<string, unknown>;
}

function contextOf(purpose: string, { bidId, scopeId, companyId }: BidIdentity): string {
  return [purpose, bidId, scopeId, companyId].join('|');
}

/** JSON filled up with spaces, which JSON does not mind. */
function toPadded(value: unknown): Buffer {
  const json = Buffer.from(JSON.stringify(value), 'utf8');
  const length = Math.ceil(json.length / PADDING_BYTES) * PADDING_BYTES;
  return Buffer.concat([json], length).fill(' ', json.length);
}

function fromPadded(bytes: Buffer): unknown {
  return JSON.parse(bytes.toString('utf8'));
}
