import type { Provenance, SourcedTable } from './provenance.ts';

export const bladeMounts = ['hand', 'walk_behind', 'wall'] as const;
export type BladeMount = (typeof bladeMounts)[number];

/** How deep a blade of one diameter cuts on one mount. */
export interface BladeReach {
  readonly diameterIn: number;
  readonly reachIn: number;
}

export type BladeReachTable = Readonly<Record<BladeMount, readonly BladeReach[]>>;

export const bladeReachSource: Provenance = {
  document: 'Common practice of sawing crews; the collar and guard of the machine at hand govern',
  certainty: 'common practice',
};

function reaches(
  ...pairs: readonly (readonly [diameterIn: number, reachIn: number])[]
): readonly BladeReach[] {
  return pairs.map(([diameterIn, reachIn]) => ({ diameterIn, reachIn }));
}

export const bladeReach: SourcedTable<BladeReachTable> = {
  source: bladeReachSource,
  rows: {
    hand: reaches([9, 3.25], [12, 4], [14, 5], [16, 6]),
    walk_behind: reaches(
      [14, 4.75],
      [18, 6.625],
      [20, 7.625],
      [24, 9.625],
      [26, 10.625],
      [30, 11.75],
      [36, 14.75],
      [42, 17.75],
    ),
    wall: reaches([24, 9.5], [30, 12], [36, 15], [42, 18]),
  },
};
