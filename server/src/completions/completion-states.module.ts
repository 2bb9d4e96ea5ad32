import { Module } from '@nestjs/common';
import { CompletionStates } from './completion-states.ts';

/** Apart from the rest of completions, since payments need it and completions need the money's readers. */
@Module({ providers: [CompletionStates], exports: [CompletionStates] })
export class CompletionStatesModule {}
