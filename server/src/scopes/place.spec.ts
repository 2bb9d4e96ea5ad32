import { distanceMiles } from '@kerfyard/common/places';
import fc from 'fast-check';
import { chordToMiles, milesToChord, toPlace } from './place.ts';

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
});
