import { randomBytes } from 'node:crypto';
import { Inject, Injectable } from '@nestjs/common';
import { CONFIG, type Config } from '../config/config.ts';
import { decrypt, encrypt, KEY_BYTES } from './aead.ts';

const contextOf = (companyId: string) => `company-key|${companyId}`;

/**
 * Each company has a key of its own, kept in `company.wrapped_key` under the master key, which lies outside the
 * database: a copy of the database alone reads no bid and no draft.
 */
@Injectable()
export class CompanyKeys {
  constructor(@Inject(CONFIG) private readonly config: Config) {}

  /** A new company's key, wrapped for its row. */
  create(companyId: string): Buffer {
    return encrypt(this.config.masterKey, randomBytes(KEY_BYTES), contextOf(companyId));
  }

  /**
   * The company's key in the clear; never stored, logged or sent.
   * @throws Error when the master key is another one or the row was altered
   */
  unwrap(companyId: string, wrapped: Buffer): Buffer {
    return decrypt(this.config.masterKey, wrapped, contextOf(companyId));
  }
}
