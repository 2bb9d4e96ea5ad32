import { checkBoolean, checkChoice, checkObject } from './check.ts';
import { CuttingInputError } from './input-error.ts';
import {
  conduitKinds,
  conduitOutsideDiameters,
  tradeSizes,
  type ConduitKind,
  type TradeSize,
} from './tables/conduit.ts';
import {
  burialLocations,
  lowPowerInRacewayUnderSlabIn,
  minimumCover,
  wiringMethods,
  type BurialLocation,
  type WiringMethod,
} from './tables/cover.ts';

export interface MinimumCoverInput {
  readonly location: BurialLocation;
  readonly wiring: WiringMethod;
  readonly inRaceway?: boolean | undefined;
}

/**
 * Least cover over underground wiring in inches, NEC Table 300.5. The adopted code and the authority having
 * jurisdiction govern.
 * @throws CuttingInputError also for direct burial under a building outside a raceway, which the table forbids
 */
export function minimumCoverIn(input: MinimumCoverInput): number {
  const fields = checkObject(input, 'input');
  const location = checkChoice(fields.location, 'location', burialLocations);
  const wiring = checkChoice(fields.wiring, 'wiring', wiringMethods);
  const inRaceway = checkBoolean(fields.inRaceway, 'inRaceway', false);
  if (location === 'under_building' && wiring === 'direct_burial' && !inRaceway) {
    throw new CuttingInputError({
      field: 'inRaceway',
      allowed: 'true under a building: the table allows direct burial there only in a raceway',
      given: fields.inRaceway,
    });
  }
  const isLowPower = wiring === 'branch_120v' || wiring === 'control_30v';
  if (location === 'under_4in_slab_no_vehicles' && isLowPower && inRaceway)
    return lowPowerInRacewayUnderSlabIn;
  return minimumCover.rows[location][wiring];
}

/**
 * Outside diameter of conduit in inches by kind and trade size, as in `'1-1/4'`.
 * @throws CuttingInputError also for a size the kind is not made in
 */
export function conduitOutsideDiameterIn(input: {
  readonly kind: ConduitKind;
  readonly tradeSize: TradeSize;
}): number {
  const fields = checkObject(input, 'input');
  const kind = checkChoice(fields.kind, 'kind', conduitKinds);
  const tradeSize = checkChoice(fields.tradeSize, 'tradeSize', tradeSizes);
  const diameterIn = conduitOutsideDiameters[kind].rows[tradeSize];
  if (diameterIn === undefined) {
    const made = Object.keys(conduitOutsideDiameters[kind].rows);
    // Object.keys puts the whole sizes first; the table's own order reads better.
    const inOrder = tradeSizes.filter((size) => made.includes(size));
    throw new CuttingInputError({
      field: 'tradeSize',
      allowed: `one of ${inOrder.join(', ')} for ${kind}`,
      given: tradeSize,
    });
  }
  return diameterIn;
}
