import { Controller, Get, Param, Query } from '@nestjs/common';
import { positionQuerySchema, zipSchema, type PlaceView } from '@kerfyard/common/places';
import type { z } from 'zod';
import { SignedIn } from '../platform/auth/access.decorators.ts';
import { AppError } from '../platform/http/app-error.ts';
import { Places } from './places.ts';

@Controller('places')
export class PlacesController {
  constructor(private readonly places: Places) {}

  @Get('zip/:zip')
  @SignedIn()
  byZip(@Param('zip', { schema: zipSchema }) zip: string): PlaceView {
    const place = this.places.find(zip);
    if (place === null) throw new AppError('not_found');
    return place;
  }

  @Get('time-zone')
  @SignedIn()
  timeZone(@Query({ schema: positionQuerySchema }) position: z.infer<typeof positionQuerySchema>): {
    timeZone: string;
  } {
    return { timeZone: this.places.timeZone(position) };
  }
}
