import { type DynamicModule, Module } from '@nestjs/common';
import { AuthModule } from './platform/auth/auth.module.ts';
import type { Config } from './platform/config/config.ts';
import { HttpModule } from './platform/http/http.module.ts';
import { PlatformModule } from './platform/platform.module.ts';

/** Features, one line each. */
const features: NonNullable<DynamicModule['imports']> = [];

@Module({})
export class AppModule {
  static register(config: Config): DynamicModule {
    return {
      module: AppModule,
      imports: [PlatformModule.register(config), HttpModule, AuthModule, ...features],
    };
  }
}
