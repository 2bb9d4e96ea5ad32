import { Inject, Injectable } from '@nestjs/common';
import type { DemoPersonView } from '@kerfyard/common/people';
import type { Origin } from '../platform/auth/access.decorators.ts';
import type { SessionTokens } from '../platform/auth/cookies.ts';
import { CONFIG, type Config } from '../platform/config/config.ts';
import { UnitOfWork } from '../platform/database/unit-of-work.ts';
import { AppError } from '../platform/http/app-error.ts';
import { SignInService } from '../people/sign-in.ts';
import { SELECT_DEMO_PEOPLE, SELECT_DEMO_PERSON, type DemoPersonRow } from './demo.queries.ts';

/** The seeded people, whom anyone may be: in demo and development mode only. */
@Injectable()
export class DemoPeople {
  constructor(
    @Inject(CONFIG) private readonly config: Config,
    private readonly uow: UnitOfWork,
    private readonly signIns: SignInService,
  ) {}

  /** Nobody where there is no demo. Not a 404: the first page asks everywhere, and browsers report those as errors. */
  async list(): Promise<DemoPersonView[]> {
    if (!this.hasDemo()) return [];
    const rows = await this.uow.rows<DemoPersonRow>(null, SELECT_DEMO_PEOPLE);
    return rows.map(presentDemoPerson);
  }

  async signIn(key: string, refreshCookie: string | null, origin: Origin): Promise<SessionTokens> {
    if (!this.hasDemo()) throw new AppError('not_found');
    const person = await this.uow.row<DemoPersonRow>(null, SELECT_DEMO_PERSON, [key]);
    if (person === null) throw new AppError('not_found');
    return this.signIns.open(person.user_id, refreshCookie, origin);
  }

  private hasDemo(): boolean {
    return this.config.mode === 'demo' || this.config.mode === 'development';
  }
}

function presentDemoPerson(row: DemoPersonRow): DemoPersonView {
  return {
    key: row.key,
    name: row.name,
    company: row.company,
    kind: row.kind ?? 'staff',
    role: row.role ?? 'staff',
  };
}
