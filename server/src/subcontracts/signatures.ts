import { Injectable } from '@nestjs/common';
import { UnitOfWork, type Tx } from '../platform/database/unit-of-work.ts';
import { SIGNATURES_OF } from './subcontract.queries.ts';
import type { Side } from './subcontract-reader.ts';

export interface SignatureRow {
  side: Side;
  user_id: string;
  person_name: string;
  typed_name: string;
  document_sha256: string;
  ip: string;
  signed_at: Date;
}

/** The signatures under a subcontract's paper, in the order they were made. */
@Injectable()
export class Signatures {
  constructor(private readonly uow: UnitOfWork) {}

  async of(tx: Tx | null, subcontractId: string): Promise<SignatureRow[]> {
    return this.uow.rows<SignatureRow>(tx, SIGNATURES_OF, [subcontractId]);
  }
}
