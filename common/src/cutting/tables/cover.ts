import type { SourcedTable } from './provenance.ts';

export const wiringMethods = [
  'direct_burial',
  'rmc_imc',
  'nonmetallic',
  'branch_120v',
  'control_30v',
] as const;
export type WiringMethod = (typeof wiringMethods)[number];

export const burialLocations = [
  'general',
  'under_2in_concrete',
  'under_building',
  'under_4in_slab_no_vehicles',
  'under_roads_parking',
  'dwelling_driveway',
  'airport',
] as const;
export type BurialLocation = (typeof burialLocations)[number];

function row(
  ...inches: readonly [number, number, number, number, number]
): Readonly<Record<WiringMethod, number>> {
  const [direct_burial, rmc_imc, nonmetallic, branch_120v, control_30v] = inches;
  return { direct_burial, rmc_imc, nonmetallic, branch_120v, control_30v };
}

/** Least cover over underground wiring, inches, 0 to 1000 V. */
export const minimumCover: SourcedTable<
  Readonly<Record<BurialLocation, Readonly<Record<WiringMethod, number>>>>
> = {
  source: {
    document: 'NEC (NFPA 70)',
    section: 'Table 300.5; 300.5(A) from 2023',
    edition: '2020 and 2023',
    certainty: 'published',
  },
  rows: {
    general: row(24, 6, 18, 12, 6),
    under_2in_concrete: row(18, 6, 12, 6, 6),
    under_building: row(0, 0, 0, 0, 0),
    under_4in_slab_no_vehicles: row(18, 4, 4, 6, 6),
    under_roads_parking: row(24, 24, 24, 24, 24),
    dwelling_driveway: row(18, 18, 18, 12, 18),
    airport: row(18, 18, 18, 18, 18),
  },
};

/** Under a 4-in slab without vehicles the two low-power columns need only this inside a raceway. */
export const lowPowerInRacewayUnderSlabIn = 4;

export const coverNote = 'The adopted code and the authority having jurisdiction govern.';
export const slabExtensionNote = 'The slab must extend 6 in beyond the installation.';
