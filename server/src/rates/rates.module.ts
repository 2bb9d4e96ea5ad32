import { Module } from '@nestjs/common';
import { RateCardController } from './rate-card.controller.ts';
import { RateCards } from './rate-cards.ts';

@Module({ controllers: [RateCardController], providers: [RateCards] })
export class RatesModule {}
