import { Inject, Injectable } from '@nestjs/common';
import { CONFIG, type Config } from '../config/config.ts';
import { deriveKey, newKey, openBytes, sealBytes } from './sealing.ts';

/**
 * Keys that lie in the database only wrapped: each under a key derived from the master key, which lies outside the
 * database, the files and their backups.
 */
@Injectable()
export class KeyVault {
  private readonly wrappingKey: Buffer;

  constructor(@Inject(CONFIG) config: Config) {
    this.wrappingKey = deriveKey(config.masterKey, 'kerfyard wrapping key');
  }

  /** Wrap key material (any length: a 32-byte key, a private key's DER) for one row, named by `context`. */
  wrapKey(key: Buffer, context: string): Buffer {
    return sealBytes(this.wrappingKey, key, context);
  }

  /** @throws Error when the row, the context or the master key is another */
  unwrapKey(wrapped: Buffer, context: string): Buffer {
    return openBytes(this.wrappingKey, wrapped, context);
  }

  /** A new company key, as it is stored in `company.wrapped_key`. */
  newCompanyKey(companyId: string): Buffer {
    return this.wrapKey(newKey(), companyContext(companyId));
  }

  /** The key under which a company's own bids and drafts are kept. */
  companyKey(wrapped: Buffer, companyId: string): Buffer {
    return this.unwrapKey(wrapped, companyContext(companyId));
  }
}

const companyContext = (companyId: string) => `company:${companyId}`;
