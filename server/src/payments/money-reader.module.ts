import { Module } from '@nestjs/common';
import { MoneyReader } from './money-reader.ts';

/** Apart from the rest, since work and payments each need the other's readers. */
@Module({ providers: [MoneyReader], exports: [MoneyReader] })
export class MoneyReaderModule {}
