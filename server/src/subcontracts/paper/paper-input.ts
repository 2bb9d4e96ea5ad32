import type { BidInput } from '@kerfyard/common/bids';
import type { ScopeBody } from '@kerfyard/common/scopes';
import type { SovRow } from '../../awards/schedule-of-values.ts';

export interface PaperCompany {
  name: string;
  phone: string;
}

/** A drawing or photo the subcontract rests on, named so that nobody can swap it: the hash is of the stored bytes. */
export interface PaperFile {
  kind: 'photo' | 'drawing' | 'document';
  name: string;
  caption: string;
  pages: number | null;
  sha256: string;
}

/** Everything the subcontract's paper says. The same input gives the same bytes. */
export interface PaperInput {
  number: string;
  scopeNumber: string;
  revision: number;
  /** When the scope was awarded. */
  awardedAt: Date;
  /** The last instant to sign. */
  signBy: Date;
  gc: PaperCompany;
  crew: PaperCompany;
  body: ScopeBody;
  bid: BidInput;
  files: readonly PaperFile[];
  sov: readonly SovRow[];
  totalCents: number;
}
