import { Module } from '@nestjs/common';
import { Books } from './books.ts';
import { Ledger } from './ledger.service.ts';
import { LedgerSeals } from './seals.ts';

@Module({ providers: [Ledger, Books, LedgerSeals], exports: [Ledger, Books, LedgerSeals] })
export class LedgerModule {}
