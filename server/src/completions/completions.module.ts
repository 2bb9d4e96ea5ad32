import { Module } from '@nestjs/common';
import { SubcontractReaderModule } from '../subcontracts/subcontract-reader.module.ts';
import { CompletionMails } from './completion-mails.ts';
import { CompletionReaderModule } from './completion-reader.module.ts';
import { CompletionsController } from './completions.controller.ts';
import { MoveCompletion } from './move-completion.ts';
import { SubmitCompletion } from './submit-completion.ts';

@Module({
  imports: [SubcontractReaderModule, CompletionReaderModule],
  controllers: [CompletionsController],
  providers: [SubmitCompletion, MoveCompletion, CompletionMails],
})
export class CompletionsModule {}
