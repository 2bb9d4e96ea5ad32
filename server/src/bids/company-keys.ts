import { Injectable } from '@nestjs/common';
import { KeyVault } from '../platform/crypto/key-vault.ts';
import { UnitOfWork, type Tx } from '../platform/database/unit-of-work.ts';
import { COMPANY_KEY } from './bid-core.queries.ts';

/** The key under which a company's own bids and drafts are kept; in memory only as long as it is used. */
@Injectable()
export class CompanyKeys {
  constructor(
    private readonly uow: UnitOfWork,
    private readonly vault: KeyVault,
  ) {}

  async of(tx: Tx | null, companyId: string): Promise<Buffer> {
    const row = await this.uow.row<{ wrapped_key: Buffer }>(tx, COMPANY_KEY, [companyId]);
    if (row === null) throw new Error('A company without a key');
    return this.vault.companyKey(row.wrapped_key, companyId);
  }
}
