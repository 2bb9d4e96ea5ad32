/** Mean radius of the Earth in miles, as in `distanceMiles` of common. */
const EARTH_RADIUS_MI = 3958.8;

/** A position as a point of the unit sphere, in the database's text form of a cube. */
export function toPlace(position: { lat: number; lon: number }): string {
  const lat = (position.lat * Math.PI) / 180;
  const lon = (position.lon * Math.PI) / 180;
  return `(${Math.cos(lat) * Math.cos(lon)}, ${Math.cos(lat) * Math.sin(lon)}, ${Math.sin(lat)})`;
}

/** The straight line through the unit sphere that spans so many miles on the ground. */
export function milesToChord(miles: number): number {
  return 2 * Math.sin(Math.min(miles / EARTH_RADIUS_MI, Math.PI) / 2);
}

/** Miles on the ground for a straight line through the unit sphere (the haversine, the other way round). */
export function chordToMiles(chord: number): number {
  return 2 * EARTH_RADIUS_MI * Math.asin(Math.min(1, chord / 2));
}

/** Miles as shown: to a tenth. */
export function shownMiles(miles: number): number {
  return Math.round(miles * 10) / 10;
}
