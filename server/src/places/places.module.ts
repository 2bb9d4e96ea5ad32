import { Module } from '@nestjs/common';
import { PlacesController } from './places.controller.ts';
import { Places } from './places.ts';

@Module({ controllers: [PlacesController], providers: [Places], exports: [Places] })
export class PlacesModule {}
