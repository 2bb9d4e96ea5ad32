import { Inject, Injectable } from '@nestjs/common';
import { may, type AccountView, type Actor, type PermissionName } from '@kerfyard/common/people';
import { SecondFactors } from '../platform/auth/second-factors.ts';
import { CONFIG, type Config } from '../platform/config/config.ts';
import { UnitOfWork } from '../platform/database/unit-of-work.ts';
import { AppError } from '../platform/http/app-error.ts';
import { SELECT_ACCOUNT, type AccountRow } from './account.queries.ts';

const moneyMoves: readonly PermissionName[] = ['money.set_aside', 'money.release', 'money.payout'];

@Injectable()
export class OwnAccount {
  constructor(
    @Inject(CONFIG) private readonly config: Config,
    private readonly uow: UnitOfWork,
    private readonly secondFactors: SecondFactors,
  ) {}

  async view(actor: Actor): Promise<AccountView> {
    const row = await this.uow.row<AccountRow>(null, SELECT_ACCOUNT, [actor.userId]);
    if (row === null) throw new AppError('not_found');
    const movesMoney = moneyMoves.some((name) => may(actor, name));
    const isRequired = this.config.secondFactor === 'money' && movesMoney;
    return {
      email: row.email,
      pendingEmail: row.pending_email,
      secondFactor: { ...(await this.secondFactors.state(actor.userId)), isRequired },
    };
  }
}
