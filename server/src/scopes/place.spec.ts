import { distanceMiles } from '@kerfyard/common/places';
import fc from 'fast-check';
import { cellsWithin, chordToMiles, milesToChord, toPlace } from './place.ts';

const position = fc.record({
  lat: fc.double({ min: -89, max: 89, noNaN: true }),
  lon: fc.double({ min: -180, max: 180, noNaN: true }),
});
const numbers = (place: string) => place.slice(1, -1).split(',').map(Number);

describe('positions on the unit sphere', () => {
  it('measure the same miles as the haversine formula (property)', () => {
    fc.assert(
      fc.property(position, position, (a, b) => {
        const [first, second] = [numbers(toPlace(a)), numbers(toPlace(b))];
        const chord = Math.hypot(...first.map((value, axis) => value - (second[axis] ?? 0)));
        expect(chordToMiles(chord)).toBeCloseTo(distanceMiles(a, b), 3);
      }),
    );
  });

  it('turn miles into a chord and back', () => {
    for (const miles of [0, 1, 42.5, 3000]) expect(chordToMiles(milesToChord(miles))).toBeCloseTo(miles, 6);
  });

  it('name every square that lies within reach (property), and none for far reaches', () => {
    const cellOf = ({ lat, lon }: { lat: number; lon: number }) =>
      (Math.floor(lat * 4) + 360) * 1440 + Math.floor(lon * 4) + 720;
    const way = fc.record({
      north: fc.double({ min: -3, max: 3, noNaN: true }),
      east: fc.double({ min: -5, max: 5, noNaN: true }),
    });
    let near = 0;
    fc.assert(
      fc.property(position, way, fc.integer({ min: 1, max: 200 }), (yard, { north, east }, miles) => {
        const lat = Math.max(-89.9, Math.min(89.9, yard.lat + north));
        const lon = ((yard.lon + east + 540) % 360) - 180;
        const cells = cellsWithin(yard, miles);
        if (cells === null || distanceMiles(yard, { lat, lon }) > miles) return;
        near += 1;
        expect(cells).toContain(cellOf({ lat, lon }));
      }),
      { numRuns: 3_000 },
    );
    expect(near).toBeGreaterThan(300);
    expect(cellsWithin({ lat: 40, lon: -105 }, 201)).toBeNull();
    expect(cellsWithin({ lat: 40, lon: -105 }, 25)?.length).toBeLessThan(40);
  });
});
