import { Module } from '@nestjs/common';
import { SubcontractEvents } from './subcontract-events.ts';
import { SubcontractReader } from './subcontract-reader.ts';

/** Apart from the rest, since visits, completions and money read subcontracts and are read by them. */
@Module({
  providers: [SubcontractReader, SubcontractEvents],
  exports: [SubcontractReader, SubcontractEvents],
})
export class SubcontractReaderModule {}
