import { Injectable } from '@nestjs/common';
import { InjectModel } from '@nestjs/sequelize';
import type { Actor, EditCompany, NewUnit, OwnCompanyView } from '@kerfyard/common/people';
import type { PlaceView } from '@kerfyard/common/places';
import type { Origin } from '../platform/auth/access.decorators.ts';
import { Audit } from '../platform/audit/audit.ts';
import { Clock } from '../platform/clock/clock.ts';
import { UnitOfWork, type Tx } from '../platform/database/unit-of-work.ts';
import { AppError } from '../platform/http/app-error.ts';
import { Places } from '../places/places.ts';
import { Company } from './company.model.ts';
import { presentOwnCompany } from './company.presenter.ts';
import { Crew, Truck } from './unit.models.ts';

/** Crews and trucks a company may keep, each. */
const MAX_UNITS = 100;

export type UnitKind = 'crew' | 'truck';

/** One's own company: always the actor's, so no id is ever asked for. */
@Injectable()
export class CompanyService {
  private readonly units: Record<UnitKind, typeof Crew | typeof Truck>;

  constructor(
    @InjectModel(Company) private readonly companies: typeof Company,
    @InjectModel(Crew) crews: typeof Crew,
    @InjectModel(Truck) trucks: typeof Truck,
    private readonly uow: UnitOfWork,
    private readonly audit: Audit,
    private readonly places: Places,
    private readonly clock: Clock,
  ) {
    this.units = { crew: crews, truck: trucks };
  }

  async view(actor: Actor): Promise<OwnCompanyView> {
    const company = await this.companies.findByPk(companyOf(actor), {
      attributes: { exclude: ['wrappedKey'] },
      include: [Crew, Truck].map((model) => ({
        model,
        separate: true,
        order: [
          ['name', 'ASC'],
          ['id', 'ASC'],
        ],
      })),
    });
    if (company === null) throw new AppError('not_found');
    return presentOwnCompany(company);
  }

  /** @throws AppError invalid_input for a yard outside the ZIP table, or a yard given by a general contractor */
  async edit(actor: Actor, input: EditCompany, origin: Origin): Promise<OwnCompanyView> {
    const companyId = companyOf(actor);
    const place = this.checkYard(actor, input);
    await this.uow.run(async (tx) => {
      const company = await this.lock(tx, companyId);
      const before = editable(company);
      const changed = { ...columnsOf(input, place), version: company.version + 1 };
      await company.update({ ...changed, updatedAt: await this.clock.now(tx) }, { transaction: tx });
      await this.audit.write(tx, {
        actor,
        action: 'company.edited',
        subject: { type: 'company', id: companyId },
        detail: { before, after: input },
        origin,
      });
    });
    return this.view(actor);
  }

  private checkYard(actor: Actor, input: EditCompany): PlaceView | null {
    const isCutting = actor.company?.kind === 'cutting_contractor';
    const hasCuttingPart = input.yard !== null || input.serviceRadiusMi !== null || input.methods.length > 0;
    if (!isCutting && hasCuttingPart) {
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
    const model = this.units[kind];
    await this.uow.run(async (tx) => {
      await this.lock(tx, companyId);
      const present = await model.findAll({ where: { companyId }, transaction: tx });
      if (present.some((unit) => unit.id === input.id && unit.name === input.name)) return;
      if (present.length >= MAX_UNITS) throw AppError.field('name', `At most ${MAX_UNITS}`);
      if (present.some((unit) => unit.name === input.name)) {
        throw AppError.field('name', 'You have one of that name');
      }
      if ((await model.findByPk(input.id, { transaction: tx })) !== null) throw new AppError('key_reused');
      await model.create({ id: input.id, companyId, name: input.name }, { transaction: tx });
      await this.audit.write(tx, {
        actor,
        action: `${kind}.added`,
        subject: { type: kind, id: input.id },
        detail: { name: input.name },
        origin,
      });
    });
  }

  private async lock(tx: Tx, companyId: string): Promise<Company> {
    const company = await this.companies.findByPk(companyId, { transaction: tx, lock: tx.LOCK.UPDATE });
    if (company === null) throw new AppError('not_found');
    return company;
  }
}

function companyOf(actor: Actor): string {
  if (actor.company === null) throw new AppError('forbidden');
  return actor.company.id;
}

/** City and state come from the ZIP table, the position from the person. */
function columnsOf(input: EditCompany, place: PlaceView | null) {
  return {
    name: input.name,
    phone: input.phone,
    yardZip: input.yard?.zip ?? null,
    yardCity: place?.city ?? null,
    yardState: place?.state ?? null,
    yardLat: input.yard?.lat ?? null,
    yardLon: input.yard?.lon ?? null,
    serviceRadiusMi: input.serviceRadiusMi,
    methods: [...new Set(input.methods)],
  };
}

function editable(company: Company): EditCompany {
  const { yardZip: zip, yardLat: lat, yardLon: lon } = company;
  return {
    name: company.name,
    phone: company.phone,
    yard: zip === null || lat === null || lon === null ? null : { zip, lat, lon },
    serviceRadiusMi: company.serviceRadiusMi,
    methods: company.methods,
  };
}
