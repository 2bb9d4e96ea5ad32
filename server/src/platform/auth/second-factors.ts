import { Injectable } from '@nestjs/common';
import { randomBytes } from 'node:crypto';
import { Clock } from '../clock/clock.ts';
import { KeyVault } from '../crypto/key-vault.ts';
import { UnitOfWork, type Tx } from '../database/unit-of-work.ts';
import { AppError } from '../http/app-error.ts';
import { hashRecoveryCode, newRecoveryCodes } from './recovery-codes.ts';
import {
  BEGIN_SECOND_FACTOR,
  CONFIRM_SECOND_FACTOR,
  DELETE_RECOVERY_CODES,
  DELETE_SECOND_FACTOR,
  INSERT_RECOVERY_CODES,
  LOCK_SECOND_FACTOR,
  SELECT_SECOND_FACTOR_STATE,
  TAKE_RECOVERY_CODE,
  TAKE_STEP,
  type SecondFactorRow,
  type SecondFactorStateRow,
} from './second-factor.queries.ts';
import { matchingStep } from './totp.ts';

/** RFC 4226, 4: 160 bits are recommended. */
const SECRET_BYTES = 20;

/** Second factors: time-based codes (RFC 6238) and the recovery codes that stand in for a lost phone. */
@Injectable()
export class SecondFactors {
  constructor(
    private readonly uow: UnitOfWork,
    private readonly vault: KeyVault,
    private readonly clock: Clock,
  ) {}

  async state(userId: string): Promise<{ isSet: boolean; recoveryCodesLeft: number }> {
    const row = await this.uow.row<SecondFactorStateRow>(null, SELECT_SECOND_FACTOR_STATE, [userId]);
    return { isSet: row?.is_set ?? false, recoveryCodesLeft: row?.recovery_codes_left ?? 0 };
  }

  /** Uses a code up. Which kind it was, or null when it does not fit or was used before. */
  async take(tx: Tx, userId: string, code: string): Promise<'code' | 'recovery_code' | null> {
    const factor = await this.uow.row<SecondFactorRow>(tx, LOCK_SECOND_FACTOR, [userId]);
    if (factor === null || !factor.is_confirmed) return null;
    const step = matchingStep(this.secretOf(factor, userId), digitsOf(code), this.clock.wallMs());
    if (step !== null) {
      return (await this.uow.row(tx, TAKE_STEP, [userId, step])) === null ? null : 'code';
    }
    const taken = await this.uow.row(tx, TAKE_RECOVERY_CODE, [userId, hashRecoveryCode(code)]);
    return taken === null ? null : 'recovery_code';
  }

  /** A fresh secret that waits for its first code. @throws AppError illegal_move where one is set already */
  async begin(tx: Tx, userId: string): Promise<Buffer> {
    const secret = randomBytes(SECRET_BYTES);
    const sealed = this.vault.wrapKey(secret, contextOf(userId));
    if ((await this.uow.row(tx, BEGIN_SECOND_FACTOR, [userId, sealed])) === null) {
      throw new AppError('illegal_move');
    }
    return secret;
  }

  /** The first code proves that the app has the secret. Gives the recovery codes. */
  async confirm(tx: Tx, userId: string, code: string): Promise<string[]> {
    const factor = await this.uow.row<SecondFactorRow>(tx, LOCK_SECOND_FACTOR, [userId]);
    if (factor === null || factor.is_confirmed) throw new AppError('illegal_move');
    const step = matchingStep(this.secretOf(factor, userId), digitsOf(code), this.clock.wallMs());
    if (step === null) throw AppError.field('code', 'That code does not fit. Wait for the next one');
    await this.uow.rows(tx, CONFIRM_SECOND_FACTOR, [userId, step]);
    return this.renewRecoveryCodes(tx, userId);
  }

  /** New recovery codes; the ones before open nothing any more. */
  async renewRecoveryCodes(tx: Tx, userId: string): Promise<string[]> {
    const codes = newRecoveryCodes();
    await this.uow.rows(tx, DELETE_RECOVERY_CODES, [userId]);
    await this.uow.rows(tx, INSERT_RECOVERY_CODES, [userId, codes.map(hashRecoveryCode)]);
    return codes;
  }

  /** Takes it away with its recovery codes. Whether there was one. */
  async remove(tx: Tx, userId: string): Promise<boolean> {
    await this.uow.rows(tx, DELETE_RECOVERY_CODES, [userId]);
    return (await this.uow.row(tx, DELETE_SECOND_FACTOR, [userId])) !== null;
  }

  private secretOf(factor: SecondFactorRow, userId: string): Buffer {
    return this.vault.unwrapKey(factor.secret_sealed, contextOf(userId));
  }
}

const contextOf = (userId: string) => `second-factor:${userId}`;

/** Apps show "123 456". */
const digitsOf = (code: string) => code.replace(/\s/g, '');
