import { Module } from '@nestjs/common';
import { PlacesModule } from '../places/places.module.ts';
import { Accounts } from './accounts.ts';
import { AuthController } from './auth.controller.ts';
import { CompanyController } from './company.controller.ts';
import { CompanyService } from './company.service.ts';
import { Me } from './me.ts';
import { SignInService } from './sign-in.ts';
import { SignUpMail } from './sign-up.mail.ts';
import { SignUpService } from './sign-up.ts';

@Module({
  imports: [PlacesModule],
  controllers: [AuthController, CompanyController],
  providers: [Accounts, CompanyService, Me, SignInService, SignUpMail, SignUpService],
  exports: [Accounts, CompanyService, Me, SignInService],
})
export class PeopleModule {}
