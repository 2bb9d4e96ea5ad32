import { Module } from '@nestjs/common';
import { APP_FILTER, APP_PIPE } from '@nestjs/core';
import { ErrorFilter } from './error.filter.ts';
import { HealthController, Readiness } from './health.controller.ts';
import { ValidationPipe } from './validation.pipe.ts';

@Module({
  controllers: [HealthController],
  providers: [
    Readiness,
    { provide: APP_FILTER, useClass: ErrorFilter },
    { provide: APP_PIPE, useClass: ValidationPipe },
  ],
})
export class HttpModule {}
