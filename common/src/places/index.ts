import { z } from 'zod';

export const zipSchema = z.string().regex(/^\d{5}$/, 'A five-digit ZIP code');
export const latSchema = z.number().min(-90).max(90);
export const lonSchema = z.number().min(-180).max(180);

/** What a ZIP code is known to be: the centroid, adjustable by hand, and the time zone there. */
export interface PlaceView {
  zip: string;
  city: string;
  state: string;
  lat: number;
  lon: number;
  timeZone: string;
}

/** Time zone of a hand-adjusted position. */
export const positionQuerySchema = z.strictObject({
  lat: z.coerce.number().min(-90).max(90),
  lon: z.coerce.number().min(-180).max(180),
});

/** Great-circle distance in miles (haversine, mean Earth radius 3958.8 mi). */
export function distanceMiles(a: { lat: number; lon: number }, b: { lat: number; lon: number }): number {
  const rad = Math.PI / 180;
  const dLat = (b.lat - a.lat) * rad;
  const dLon = (b.lon - a.lon) * rad;
  const h = Math.sin(dLat / 2) ** 2 + Math.cos(a.lat * rad) * Math.cos(b.lat * rad) * Math.sin(dLon / 2) ** 2;
  return 2 * 3958.8 * Math.asin(Math.min(1, Math.sqrt(h)));
}
