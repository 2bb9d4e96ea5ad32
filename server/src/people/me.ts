import { Injectable } from '@nestjs/common';
import { may, permissions, type Actor, type MeView, type PermissionName } from '@kerfyard/common/people';
import { AccessTokens } from '../platform/auth/access-tokens.ts';
import { Actors } from '../platform/auth/actors.ts';
import { toNumber } from '../platform/database/codecs.ts';
import { UnitOfWork } from '../platform/database/unit-of-work.ts';
import { AppError } from '../platform/http/app-error.ts';
import { COUNT_UNREAD, SELECT_EMAIL } from './people.queries.ts';

/** Who is signed in, with what they may do. */
@Injectable()
export class Me {
  constructor(
    private readonly uow: UnitOfWork,
    private readonly actors: Actors,
    private readonly accessTokens: AccessTokens,
  ) {}

  async view(actor: Actor): Promise<MeView> {
    const person = await this.uow.row<{ email: string }>(null, SELECT_EMAIL, [actor.userId]);
    return {
      user: { id: actor.userId, name: actor.name, email: person?.email ?? '', isStaff: actor.isStaff },
      company: actor.company,
      role: actor.role,
      permissions: (Object.keys(permissions) as PermissionName[]).filter((name) => may(actor, name)),
      limits: actor.limits,
      unread: { messages: await this.unread(actor) },
    };
  }

  /** The view of whoever an access token, made this moment, belongs to. */
  async viewOf(accessToken: string): Promise<MeView> {
    const claims = this.accessTokens.read(accessToken);
    const actor = claims === null ? null : await this.actors.ofSession(claims);
    if (actor === null) throw new AppError('unauthenticated');
    return this.view(actor);
  }

  private async unread(actor: Actor): Promise<number> {
    if (actor.company === null) return 0;
    const row = await this.uow.row<{ messages: string }>(null, COUNT_UNREAD, [
      actor.userId,
      actor.company.id,
    ]);
    return toNumber(row?.messages ?? 0);
  }
}
