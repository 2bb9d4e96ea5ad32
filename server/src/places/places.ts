import { Injectable } from '@nestjs/common';
import timeZoneAt from '@photostructure/tz-lookup';
import zipcodes from 'zipcodes';
import type { PlaceView } from '@kerfyard/common/places';

/**
 * ZIP centroids of the package `zipcodes` (BSD licence; its README names a public list of U.S. ZIP codes) and time zones
 * of `@photostructure/tz-lookup` (CC0; boundaries from timezone-boundary-builder, ODbL). Both are coarse: a person may
 * move the position, and near a zone's edge the zone may need another look.
 */
@Injectable()
export class Places {
  /** A US ZIP code's centroid and the time zone there, or null when the table does not have it. */
  find(zip: string): PlaceView | null {
    const record = zipcodes.lookup(zip);
    if (record === undefined || record.country !== 'US') return null;
    const position = { lat: Number(record.latitude), lon: Number(record.longitude) };
    // Some three hundred rows have no position.
    if (!Number.isFinite(position.lat) || !Number.isFinite(position.lon) || position.lat === 0) return null;
    return { zip, city: record.city, state: record.state, ...position, timeZone: this.timeZone(position) };
  }

  /** The IANA time zone at a position. */
  timeZone({ lat, lon }: { lat: number; lon: number }): string {
    return timeZoneAt(lat, lon);
  }
}
