import { Module } from '@nestjs/common';
import { CompletionReader } from './completion-reader.ts';

/** Apart from the rest, since a subcontract shows its completions and a completion reads its subcontract. */
@Module({ providers: [CompletionReader], exports: [CompletionReader] })
export class CompletionReaderModule {}
