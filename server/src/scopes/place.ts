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

/** Squares of the database's `cell` column along one degree. */
const CELLS_PER_DEGREE = 4;
/** Past this the squares are too many to name, and too many scopes lie in them for an index to help. */
const MAX_CELL_MILES = 200;

/**
 * The quarter-degree squares that a circle on the ground touches, as the `cell` column numbers them; null where
 * naming them does not help (far reaches, and circles round a pole). They cover the circle and a little more.
 */
export function cellsWithin(centre: { lat: number; lon: number }, miles: number): number[] | null {
  const radiusDeg = (miles / EARTH_RADIUS_MI) * (180 / Math.PI);
  const farthestLat = Math.abs(centre.lat) + radiusDeg;
  if (miles > MAX_CELL_MILES || farthestLat >= 89) return null;
  // The circle's widest meridians touch it a little off its centre's latitude.
  const sine = Math.sin((radiusDeg * Math.PI) / 180) / Math.cos((centre.lat * Math.PI) / 180);
  const lonSpanDeg = (Math.asin(Math.min(1, sine)) * 180) / Math.PI;
  const cells: number[] = [];
  const rows = cellRange(centre.lat, radiusDeg);
  const columns = cellRange(centre.lon, lonSpanDeg);
  for (let row = rows.first; row <= rows.last; row += 1) {
    for (let column = columns.first; column <= columns.last; column += 1) {
      cells.push((row + 360) * 1440 + ((((column + 720) % 1440) + 1440) % 1440));
    }
  }
  return cells;
}

function cellRange(middle: number, span: number): { first: number; last: number } {
  return {
    first: Math.floor((middle - span) * CELLS_PER_DEGREE),
    last: Math.floor((middle + span) * CELLS_PER_DEGREE),
  };
}
