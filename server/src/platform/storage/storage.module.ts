import { Global, Module } from '@nestjs/common';
import { Storage } from './storage.ts';

@Global()
@Module({ providers: [Storage], exports: [Storage] })
export class StorageModule {}
