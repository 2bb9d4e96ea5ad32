import { Module } from '@nestjs/common';
import { Books } from './books.ts';
import { Ledger } from './ledger.service.ts';

@Module({ providers: [Ledger, Books], exports: [Ledger, Books] })
export class LedgerModule {}
