import { Body, Controller, Get, Post, Put } from '@nestjs/common';
import {
  editCompanySchema,
  unitNameSchema,
  type Actor,
  type EditCompany,
  type NewUnit,
  type OwnCompanyView,
} from '@kerfyard/common/people';
import { CurrentActor, Needs, RequestOrigin, type Origin } from '../platform/auth/access.decorators.ts';
import { Idempotent } from '../platform/idempotency/idempotent.decorator.ts';
import { CompanyService } from './company.service.ts';

@Controller('company')
export class CompanyController {
  constructor(private readonly companies: CompanyService) {}

  @Get()
  @Needs('company.read')
  view(@CurrentActor() actor: Actor): Promise<OwnCompanyView> {
    return this.companies.view(actor);
  }

  @Put()
  @Needs('company.edit')
  edit(
    @CurrentActor() actor: Actor,
    @Body({ schema: editCompanySchema }) input: EditCompany,
    @RequestOrigin() origin: Origin,
  ): Promise<OwnCompanyView> {
    return this.companies.edit(actor, input, origin);
  }

  @Post('crews')
  @Needs('company.edit')
  @Idempotent()
  addCrew(
    @CurrentActor() actor: Actor,
    @Body({ schema: unitNameSchema }) input: NewUnit,
    @RequestOrigin() origin: Origin,
  ): Promise<void> {
    return this.companies.addUnit(actor, 'crew', input, origin);
  }

  @Post('trucks')
  @Needs('company.edit')
  @Idempotent()
  addTruck(
    @CurrentActor() actor: Actor,
    @Body({ schema: unitNameSchema }) input: NewUnit,
    @RequestOrigin() origin: Origin,
  ): Promise<void> {
    return this.companies.addUnit(actor, 'truck', input, origin);
  }
}
