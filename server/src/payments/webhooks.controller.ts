import { Controller, Headers, HttpCode, Post, Req, type RawBodyRequest } from '@nestjs/common';
import type { Request } from 'express';
import { Public } from '../platform/auth/access.decorators.ts';
import { StripeEvents } from './stripe-events.ts';

/** Where the provider tells what happened. Two endpoints, two secrets: ours, and connected accounts'. */
@Controller('payments/webhooks')
export class WebhooksController {
  constructor(private readonly events: StripeEvents) {}

  @Post('account')
  @HttpCode(200)
  @Public()
  account(
    @Req() request: RawBodyRequest<Request>,
    @Headers('stripe-signature') signature?: string,
  ): Promise<void> {
    return this.events.receive('account', request.rawBody, signature);
  }

  @Post('connect')
  @HttpCode(200)
  @Public()
  connect(
    @Req() request: RawBodyRequest<Request>,
    @Headers('stripe-signature') signature?: string,
  ): Promise<void> {
    return this.events.receive('connect', request.rawBody, signature);
  }
}
