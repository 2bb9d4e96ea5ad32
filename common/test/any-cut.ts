import fc from 'fast-check';
import { cutKinds, type Cut, type CutKind } from '../src/cutting/index.ts';

// Small enough that pieces and joints always exist.
const feet = fc.double({ min: 0.5, max: 60, noNaN: true });
const inches = fc.double({ min: 2, max: 14, noNaN: true });
const count = fc.integer({ min: 1, max: 20 });
const removal = fc.option(
  fc.record({ densityPcf: fc.constant(150), maxPieceLb: fc.integer({ min: 400, max: 5_000 }) }),
  { nil: undefined },
);
const panel = { lengthFt: feet, widthFt: feet, thicknessIn: inches, count };
const blade = fc.constantFrom({}, { bladeDiameterIn: 42, passThroughIn: 0.5 });
const byKind: Readonly<Record<CutKind, fc.Arbitrary<Cut>>> = {
  line: fc.record({ kind: fc.constant('line'), lengthFt: feet, depthIn: inches, count }),
  trench: fc
    .tuple(
      fc.record({ kind: fc.constant('trench'), ...panel, endCuts: fc.constantFrom(0, 1, 2), removal }),
      blade,
    )
    .map(([cut, saw]) => ({ ...cut, ...saw })),
  opening: fc
    .tuple(
      fc.record({
        kind: fc.constant('opening'),
        ...panel,
        corners: fc.constantFrom('overcut', 'cored', 'square'),
        uncutSides: fc.subarray(['top', 'bottom', 'left', 'right'] as const),
        removal,
      }),
      blade,
    )
    .map(([cut, saw]) => ({ ...cut, ...saw })),
  core: fc.record({ kind: fc.constant('core'), diameterIn: inches, depthIn: inches, count }),
  stitch: fc.record({
    kind: fc.constant('stitch'),
    lengthIn: fc.double({ min: 20, max: 400, noNaN: true }),
    bitDiameterIn: inches,
    overlapIn: fc.double({ min: 0, max: 1.5, noNaN: true }),
    closed: fc.boolean(),
    depthIn: inches,
    count,
  }),
  joints: fc.record({
    kind: fc.constant('joints'),
    ...panel,
    spacingFactor: fc.integer({ min: 24, max: 36 }),
    capFt: fc.constantFrom(12, 15, 18),
  }),
  wire: fc.record({
    kind: fc.constant('wire'),
    areaSqFt: feet,
    pilotCores: fc.integer({ min: 0, max: 6 }),
    pilotDiameterIn: inches,
    depthIn: inches,
    count,
  }),
  curb: fc.record({ kind: fc.constant('curb'), lengthFt: feet, heightIn: inches, count }),
  chase: fc.record({ kind: fc.constant('chase'), lengthFt: feet, widthIn: inches, depthIn: inches, count }),
  block: fc.record({ kind: fc.constant('block'), cutLengthIn: inches, depthIn: inches, count }),
  pipe: fc.record({ kind: fc.constant('pipe'), outsideDiameterIn: inches, count }),
  bar: fc.record({
    kind: fc.constant('bar'),
    diameterIn: fc.double({ min: 0.25, max: 2, noNaN: true }),
    count,
  }),
  lip: fc.record({
    kind: fc.constant('lip'),
    widthFt: feet,
    heightIn: fc.double({ min: 0.1, max: 3, noNaN: true }),
    runPerRise: fc.integer({ min: 8, max: 20 }),
    count,
  }),
};
/** A cut of any kind. */
export const anyCut: fc.Arbitrary<Cut> = fc.oneof(...cutKinds.map((kind) => byKind[kind]));
