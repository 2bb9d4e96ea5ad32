import { Injectable } from '@nestjs/common';
import type { Actor, EditCompany, NewUnit, OwnCompanyView } from '@kerfyard/common/people';
import type { Origin } from '../platform/auth/access.decorators.ts';
import { Audit } from '../platform/audit/audit.ts';
import { UnitOfWork, type Tx } from '../platform/database/unit-of-work.ts';
import { AppError } from '../platform/http/app-error.ts';
import { Places } from '../places/places.ts';
import { presentOwnCompany } from './company.presenter.ts';
import {
  INSERT_CREW,
  INSERT_TRUCK,
  LOCK_COMPANY,
  SELECT_COMPANY,
  SELECT_CREWS,
  SELECT_TRUCKS,
  UPDATE_COMPANY,
  type CompanyRow,
  type UnitRow,
} from './company.queries.ts';

/** Crews and trucks a company may keep, each. */
const MAX_UNITS = 100;

const units = {
  crew: { insert: INSERT_CREW, select: SELECT_CREWS },
  truck: { insert: INSERT_TRUCK, select: SELECT_TRUCKS },
} as const;
export type UnitKind = keyof typeof units;

/** One's own company: always the actor's, so no id is ever asked for. */
@Injectable()
export class CompanyService {
  constructor(
    private readonly uow: UnitOfWork,
    private readonly audit: Audit,
    private readonly places: Places,
  ) {}

  async view(actor: Actor): Promise<OwnCompanyView> {
    const companyId = companyOf(actor);
    const [row, crews, trucks] = await Promise.all([
      this.uow.row<CompanyRow>(null, SELECT_COMPANY, [companyId]),
      this.uow.rows<UnitRow>(null, SELECT_CREWS, [companyId]),
      this.uow.rows<UnitRow>(null, SELECT_TRUCKS, [companyId]),
    ]);
    if (row === null) throw new AppError('not_found');
    return presentOwnCompany(row, crews, trucks);
  }

  /** @throws AppError invalid_input for a yard outside the ZIP table, or a yard given by a general contractor */
  async edit(actor: Actor, input: EditCompany, origin: Origin): Promise<OwnCompanyView> {
    const companyId = companyOf(actor);
    const place = this.checkYard(actor, input);
    await this.uow.run(async (tx) => {
      const before = await this.lock(tx, companyId);
      await this.uow.rows(tx, UPDATE_COMPANY, [
        companyId,
        input.name,
        input.phone,
        input.yard?.zip ?? null,
        place?.city ?? null,
        place?.state ?? null,
        input.yard?.lat ?? null,
        input.yard?.lon ?? null,
        input.serviceRadiusMi,
        [...new Set(input.methods)],
      ]);
      await this.audit.write(tx, {
        actor,
        action: 'company.edited',
        subject: { type: 'company', id: companyId },
        detail: { before: editable(before), after: input },
        origin,
      });
    });
    return this.view(actor);
  }

  private checkYard(actor: Actor, input: EditCompany): { city: string; state: string } | null {
    const isCutting = actor.company?.kind === 'cutting_contractor';
    if (!isCutting && (input.yard !== null || input.serviceRadiusMi !== null || input.methods.length > 0)) {
      throw AppError.field('yard', 'Only a cutting contractor has a yard, a service radius and methods');
    }
    if (input.yard === null) return null;
    const place = this.places.find(input.yard.zip);
    if (place === null) throw AppError.field('yard.zip', 'This ZIP code is not in our table');
    return place;
  }

  /** Adds a crew or a truck under the id its form made: the same press sent twice adds one. */
  async addUnit(actor: Actor, kind: UnitKind, input: NewUnit, origin: Origin): Promise<void> {
    const companyId = companyOf(actor);
    if (actor.company?.kind !== 'cutting_contractor') throw new AppError('forbidden');
    await this.uow.run(async (tx) => {
      await this.lock(tx, companyId);
      const present = await this.uow.rows<UnitRow>(tx, units[kind].select, [companyId]);
      if (present.some((unit) => unit.id === input.id && unit.name === input.name)) return;
      if (present.length >= MAX_UNITS) throw AppError.field('name', `At most ${MAX_UNITS}`);
      if (present.some((unit) => unit.name === input.name))
        throw AppError.field('name', 'You have one of that name');
      const added = await this.uow.row(tx, units[kind].insert, [input.id, companyId, input.name]);
      if (added === null) throw new AppError('key_reused');
      await this.audit.write(tx, {
        actor,
        action: `${kind}.added`,
        subject: { type: kind, id: input.id },
        detail: { name: input.name },
        origin,
      });
    });
  }

  private async lock(tx: Tx, companyId: string): Promise<CompanyRow> {
    const row = await this.uow.row<CompanyRow>(tx, LOCK_COMPANY, [companyId]);
    if (row === null) throw new AppError('not_found');
    return row;
  }
}

function companyOf(actor: Actor): string {
  if (actor.company === null) throw new AppError('forbidden');
  return actor.company.id;
}

function editable(row: CompanyRow): EditCompany {
  const { yard_zip: zip, yard_lat: lat, yard_lon: lon } = row;
  return {
    name: row.name,
    phone: row.phone,
    yard: zip === null || lat === null || lon === null ? null : { zip, lat, lon },
    serviceRadiusMi: row.service_radius_mi,
    methods: row.methods,
  };
}
