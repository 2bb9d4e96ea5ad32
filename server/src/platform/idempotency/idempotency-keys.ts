import { Inject, Injectable, type OnModuleInit } from '@nestjs/common';
import { createHmac, timingSafeEqual } from 'node:crypto';
import { CONFIG, type Config } from '../config/config.ts';
import { deriveKey } from '../crypto/sealing.ts';
import { UnitOfWork } from '../database/unit-of-work.ts';
import { AppError } from '../http/app-error.ts';
import { Sweeps } from '../jobs/sweeps.ts';
import {
  CLAIM_KEY,
  DELETE_OLD_KEYS,
  FINISH_KEY,
  RELEASE_KEY,
  SELECT_KEY,
  TAKE_OVER_KEY,
  type KeyRow,
} from './idempotency.queries.ts';

const ABANDONED_SECONDS = 60;

export interface Claim {
  /** The company, or the person outside companies, within which keys are unique. */
  ownerId: string;
  key: string;
  route: string;
  /** What must be the same under the same key; kept as an HMAC, since it may carry an amount. */
  input: string;
}

export interface EarlierReply {
  status: number;
  response: unknown;
}

/** Which request keys were used for what, and what was answered. */
@Injectable()
export class IdempotencyKeys implements OnModuleInit {
  private readonly hmacKey: Buffer;

  constructor(
    @Inject(CONFIG) config: Config,
    private readonly uow: UnitOfWork,
    private readonly sweeps: Sweeps,
  ) {
    this.hmacKey = deriveKey(config.signingSecret, 'kerfyard idempotency input');
  }

  onModuleInit(): void {
    this.sweeps.register('old request keys', async () => void (await this.uow.rows(null, DELETE_OLD_KEYS)));
  }

  /**
   * Take the key, or give the reply that was made under it.
   * @throws AppError key_reused, request_running
   */
  async claim(claim: Claim): Promise<EarlierReply | null> {
    const hmac = this.hmac(claim);
    const bind = [claim.ownerId, claim.key, claim.route, hmac];
    if ((await this.uow.row(null, CLAIM_KEY, bind)) !== null) return null;
    const row = await this.uow.row<KeyRow>(null, SELECT_KEY, [claim.ownerId, claim.key]);
    // Released between the two statements: the other request was refused. The caller tries again.
    if (row === null) throw new AppError('request_running');
    const isSame = row.route === claim.route && timingSafeEqual(row.input_hmac, hmac);
    if (!isSame) throw new AppError('key_reused');
    if (row.status !== null) return { status: row.status, response: row.response };
    const isTakenOver = await this.uow.row(null, TAKE_OVER_KEY, [...bind, ABANDONED_SECONDS]);
    if (isTakenOver === null) throw new AppError('request_running');
    return null;
  }

  async finish(claim: Claim, status: number, response: unknown): Promise<void> {
    const stored = response === undefined ? null : JSON.stringify(response);
    await this.uow.rows(null, FINISH_KEY, [claim.ownerId, claim.key, status, stored]);
  }

  async release(claim: Claim): Promise<void> {
    await this.uow.rows(null, RELEASE_KEY, [claim.ownerId, claim.key]);
  }

  private hmac(claim: Claim): Buffer {
    return createHmac('sha256', this.hmacKey).update(`${claim.route}\n${claim.input}`).digest();
  }
}
