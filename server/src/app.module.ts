import { type DynamicModule, Module } from '@nestjs/common';
import { CompletionsModule } from './completions/completions.module.ts';
import { VisitsModule } from './visits/visits.module.ts';
import { SubcontractsModule } from './subcontracts/subcontracts.module.ts';
import { AwardsModule } from './awards/awards.module.ts';
import { BidsModule } from './bids/bids.module.ts';
import { ScopesModule } from './scopes/scopes.module.ts';
import { PaymentsModule } from './payments/payments.module.ts';
import { DemoModule } from './demo/demo.module.ts';
import { FilesModule } from './files/files.module.ts';
import { AccountModule } from './account/account.module.ts';
import { MembersModule } from './members/members.module.ts';
import { PeopleModule } from './people/people.module.ts';
import { PlacesModule } from './places/places.module.ts';
import { RatesModule } from './rates/rates.module.ts';
import { AuthModule } from './platform/auth/auth.module.ts';
import type { Config } from './platform/config/config.ts';
import { HttpModule } from './platform/http/http.module.ts';
import { MailModule } from './platform/mail/mail.module.ts';
import { LiveModule } from './platform/realtime/live.module.ts';
import { PlatformModule } from './platform/platform.module.ts';
import { StorageModule } from './platform/storage/storage.module.ts';
import { TalkModule } from './talk/talk.module.ts';

/** Features, one line each. */
const features: NonNullable<DynamicModule['imports']> = [
  PeopleModule,
  AccountModule,
  MembersModule,
  PlacesModule,
  FilesModule,
  TalkModule,
  ScopesModule,
  BidsModule,
  RatesModule,
  AwardsModule,
  SubcontractsModule,
  VisitsModule,
  CompletionsModule,
  PaymentsModule,
  DemoModule,
];

@Module({})
export class AppModule {
  static register(config: Config): DynamicModule {
    return {
      module: AppModule,
      imports: [
        PlatformModule.register(config),
        HttpModule,
        AuthModule,
        MailModule,
        StorageModule,
        LiveModule,
        ...features,
      ],
    };
  }
}
