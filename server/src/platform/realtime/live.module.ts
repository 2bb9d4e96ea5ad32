import { Module } from '@nestjs/common';
import { LiveGateway } from './live.gateway.ts';

@Module({ providers: [LiveGateway] })
export class LiveModule {}
