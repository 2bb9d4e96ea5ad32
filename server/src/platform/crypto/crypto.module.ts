import { Global, Module } from '@nestjs/common';
import { CompanyKeys } from './company-keys.ts';

@Global()
@Module({ providers: [CompanyKeys], exports: [CompanyKeys] })
export class CryptoModule {}
