import { Module } from '@nestjs/common';
import { ScopeAccess } from './scope-access.ts';
import { ScopeEvents } from './scope-events.ts';
import { ScopeReader } from './scope-reader.ts';

/** What other features need of scopes: reading, access, sequence numbers and hints. */
@Module({
  providers: [ScopeReader, ScopeEvents, ScopeAccess],
  exports: [ScopeReader, ScopeEvents, ScopeAccess],
})
export class ScopeCoreModule {}
