import { Injectable } from '@nestjs/common';
import { InjectModel } from '@nestjs/sequelize';
import type { CompanyKind, Role } from '@kerfyard/common/people';
import { KeyVault } from '../platform/crypto/key-vault.ts';
import { UnitOfWork, type Tx } from '../platform/database/unit-of-work.ts';
import { newId } from '../platform/ids/ids.ts';
import { Company } from './company.model.ts';
import { Membership } from './membership.model.ts';
import { INSERT_USER } from './people.queries.ts';

export interface NewPerson {
  name: string;
  email: string;
  /** As `Passwords.hash` gives it. */
  passwordHash: string;
}

export interface NewCompany {
  kind: CompanyKind;
  name: string;
  phone: string;
}

export interface NewMembership {
  companyId: string;
  role: Role;
  /** In cents; null is unlimited. Owners always are. */
  signLimitCents?: number | null;
  setAsideLimitCents?: number | null;
  changeLimitCents?: number | null;
}

/** Makes companies and people whose e-mail address is proven: the end of a sign-up, staff, the demo. */
@Injectable()
export class Accounts {
  constructor(
    @InjectModel(Company) private readonly companies: typeof Company,
    @InjectModel(Membership) private readonly memberships: typeof Membership,
    private readonly uow: UnitOfWork,
    private readonly vault: KeyVault,
  ) {}

  /** A company with its own key. Gives its id. */
  async createCompany(tx: Tx, company: NewCompany): Promise<string> {
    const id = newId();
    const wrappedKey = this.vault.newCompanyKey(id);
    await this.companies.create({ id, ...company, wrappedKey }, { transaction: tx });
    return id;
  }

  /** A person who may sign in. Null when the address has an account already. */
  async createPerson(tx: Tx, person: NewPerson, isStaff = false): Promise<string | null> {
    const row = await this.uow.row<{ id: string }>(tx, INSERT_USER, [
      newId(),
      person.email,
      person.name,
      person.passwordHash,
      isStaff,
    ]);
    return row?.id ?? null;
  }

  async addMember(tx: Tx, userId: string, membership: NewMembership): Promise<void> {
    await this.memberships.create({ userId, ...membership }, { transaction: tx });
  }
}
