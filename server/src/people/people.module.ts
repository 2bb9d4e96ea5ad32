import { Module } from '@nestjs/common';
import { SequelizeModule } from '@nestjs/sequelize';
import { PlacesModule } from '../places/places.module.ts';
import { Accounts } from './accounts.ts';
import { AuthController } from './auth.controller.ts';
import { CompanyController } from './company.controller.ts';
import { Company } from './company.model.ts';
import { CompanyService } from './company.service.ts';
import { Me } from './me.ts';
import { Membership } from './membership.model.ts';
import { SignInService } from './sign-in.ts';
import { SignUpMail } from './sign-up.mail.ts';
import { SignUpService } from './sign-up.ts';
import { Crew, Truck } from './unit.models.ts';

@Module({
  imports: [PlacesModule, SequelizeModule.forFeature([Company, Crew, Truck, Membership])],
  controllers: [AuthController, CompanyController],
  providers: [Accounts, CompanyService, Me, SignInService, SignUpMail, SignUpService],
  exports: [Accounts, CompanyService, Me, SignInService],
})
export class PeopleModule {}
