import { Module } from '@nestjs/common';
import { MoneyReaderModule } from '../payments/money-reader.module.ts';
import { VisitReader } from './visit-reader.ts';

/** Apart from the rest, since a subcontract shows its visits and a visit reads its subcontract. */
@Module({ imports: [MoneyReaderModule], providers: [VisitReader], exports: [VisitReader] })
export class VisitReaderModule {}
