import { type DynamicModule, Module } from '@nestjs/common';
import { DemoModule } from './demo/demo.module.ts';
import { FilesModule } from './files/files.module.ts';
import { PeopleModule } from './people/people.module.ts';
import { PlacesModule } from './places/places.module.ts';
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
  PlacesModule,
  FilesModule,
  TalkModule,
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
