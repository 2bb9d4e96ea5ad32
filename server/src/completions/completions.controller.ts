import { Body, Controller, HttpCode, Param, Post } from '@nestjs/common';
import { idSchema } from '@kerfyard/common/api';
import {
  submitCompletionSchema,
  type CompletionView,
  type SubmitCompletion as SubmitInput,
} from '@kerfyard/common/completions';
import type { Actor } from '@kerfyard/common/people';
import { CurrentActor, Needs, RequestOrigin, type Origin } from '../platform/auth/access.decorators.ts';
import { MoveCompletion } from './move-completion.ts';
import { SubmitCompletion } from './submit-completion.ts';

@Controller('completions')
export class CompletionsController {
  constructor(
    private readonly submission: SubmitCompletion,
    private readonly moves: MoveCompletion,
  ) {}

  @Post()
  @Needs('completion.submit')
  submit(
    @CurrentActor() actor: Actor,
    @RequestOrigin() origin: Origin,
    @Body({ schema: submitCompletionSchema }) input: SubmitInput,
  ): Promise<CompletionView> {
    return this.submission.submit(actor, origin, input);
  }

  @Post(':id/accept')
  @HttpCode(200)
  @Needs('completion.accept')
  accept(
    @CurrentActor() actor: Actor,
    @RequestOrigin() origin: Origin,
    @Param('id', { schema: idSchema }) id: string,
  ): Promise<CompletionView> {
    return this.moves.accept(actor, origin, id);
  }

  @Post(':id/withdraw')
  @HttpCode(200)
  @Needs('completion.submit')
  withdraw(
    @CurrentActor() actor: Actor,
    @RequestOrigin() origin: Origin,
    @Param('id', { schema: idSchema }) id: string,
  ): Promise<CompletionView> {
    return this.moves.withdraw(actor, origin, id);
  }
}
