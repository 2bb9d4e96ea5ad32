import { describe, expect, it } from 'vitest';
import { describeRefusals, errorOf, type Subject } from '../../test/engine-refusals.ts';
import * as engine from './index.ts';

const trenchPlanInput = {
  lengthFt: 10,
  widthIn: 12,
  slabThicknessIn: 4,
  location: 'general',
  wiring: 'rmc_imc',
  conduitKind: 'emt',
  tradeSize: '1',
  beddingIn: 2,
  swellPct: 25,
};

const subjects: Readonly<Record<string, Subject>> = {
  piecePlan: {
    calculate: engine.piecePlan,
    input: { lengthFt: 8, widthFt: 4, thicknessIn: 8, maxPieceLb: 1_000 },
    numbers: { lengthFt: 'positive', widthFt: 'positive', thicknessIn: 'positive', maxPieceLb: 'positive' },
    optional: ['densityPcf', 'allowancePct', 'maxSideFt', 'maxShortSideFt'],
  },
  overcutIn: {
    calculate: engine.overcutIn,
    input: { bladeDiameterIn: 24, thicknessIn: 8, passThroughIn: 1 },
    numbers: { bladeDiameterIn: 'positive', thicknessIn: 'positive', passThroughIn: 'zero' },
  },
  cornerCoreDiameterIn: {
    calculate: engine.cornerCoreDiameterIn,
    input: { overcutIn: 6 },
    numbers: { overcutIn: 'positive' },
    choices: ['placement'],
  },
  cornerChoices: {
    calculate: engine.cornerChoices,
    input: { thicknessIn: 8, bladeDiameterIn: 24, count: 1 },
    numbers: { thicknessIn: 'positive', bladeDiameterIn: 'positive', count: 'positive' },
    optional: ['passThroughIn'],
  },
  coreWeightLb: {
    calculate: engine.coreWeightLb,
    input: { diameterIn: 12, lengthIn: 10 },
    numbers: { diameterIn: 'positive', lengthIn: 'positive' },
    optional: ['densityPcf'],
  },
  slabWeightLb: {
    calculate: engine.slabWeightLb,
    input: { lengthFt: 8, widthFt: 8, thicknessIn: 6 },
    numbers: { lengthFt: 'positive', widthFt: 'positive', thicknessIn: 'positive' },
    optional: ['densityPcf'],
  },
  stitchHoles: {
    calculate: engine.stitchHoles,
    input: { lengthIn: 40, bitDiameterIn: 4, overlapIn: 1, closed: false, depthIn: 8 },
    numbers: { lengthIn: 'positive', bitDiameterIn: 'positive', overlapIn: 'zero', depthIn: 'positive' },
    choices: ['closed'],
  },
  bladeReachIn: {
    calculate: engine.bladeReachIn,
    input: { diameterIn: 14, mount: 'hand' },
    numbers: { diameterIn: 'positive' },
    choices: ['mount'],
  },
  surfaceSpeedSfm: {
    calculate: engine.surfaceSpeedSfm,
    input: { diameterIn: 14, rpm: 2_592 },
    numbers: { diameterIn: 'positive', rpm: 'positive' },
  },
  rpmForSurfaceSpeed: {
    calculate: engine.rpmForSurfaceSpeed,
    input: { diameterIn: 14, sfm: 9_500 },
    numbers: { diameterIn: 'positive', sfm: 'positive' },
  },
  passPlan: {
    calculate: engine.passPlan,
    input: { depthIn: 6, maxPassIn: 2, scoreIn: 1 },
    numbers: { depthIn: 'positive', maxPassIn: 'positive', scoreIn: 'positive' },
  },
  methodsFor: {
    calculate: engine.methodsFor,
    input: {
      work: 'opening',
      depthIn: 8,
      face: 'wall',
      indoors: true,
      enginesAllowed: false,
      overcutsAllowed: true,
      bothFacesReachable: true,
    },
    numbers: { depthIn: 'positive' },
    optional: ['diameterIn', 'doorwayIn', 'floorLimitPsf'],
    choices: ['work', 'face', 'indoors', 'enginesAllowed', 'overcutsAllowed', 'bothFacesReachable'],
  },
  levelAtDistanceDba: {
    calculate: engine.levelAtDistanceDba,
    input: { levelDba: 92, referenceFt: 50, distanceFt: 100 },
    numbers: { levelDba: 'zero', referenceFt: 'positive', distanceFt: 'positive' },
  },
  slingTension: {
    calculate: engine.slingTension,
    input: { loadLb: 1_000, legs: 2, angleDeg: 60 },
    numbers: { loadLb: 'positive', legs: 'positive', angleDeg: 'positive' },
    choices: ['equalized'],
  },
  minimumCoverIn: {
    calculate: engine.minimumCoverIn,
    input: { location: 'general', wiring: 'rmc_imc' },
    numbers: {},
    choices: ['location', 'wiring', 'inRaceway'],
  },
  conduitOutsideDiameterIn: {
    calculate: engine.conduitOutsideDiameterIn,
    input: { kind: 'pvc', tradeSize: '2' },
    numbers: {},
    choices: ['kind', 'tradeSize'],
  },
  trenchPlan: {
    calculate: engine.trenchPlan,
    input: trenchPlanInput,
    numbers: {
      lengthFt: 'positive',
      widthIn: 'positive',
      slabThicknessIn: 'positive',
      beddingIn: 'zero',
      swellPct: 'zero',
    },
    optional: ['wastePct', 'densityPcf'],
    choices: ['location', 'wiring', 'conduitKind', 'tradeSize', 'coverFrom', 'soil'],
  },
  excavationRules: {
    calculate: engine.excavationRules,
    input: { depthFt: 5, soil: 'B' },
    numbers: { depthFt: 'positive' },
    choices: ['soil'],
  },
  slopedTrench: {
    calculate: engine.slopedTrench,
    input: { bottomWidthFt: 3, depthFt: 8, soil: 'B' },
    numbers: { bottomWidthFt: 'positive', depthFt: 'positive' },
    choices: ['soil'],
  },
  jointPlan: {
    calculate: engine.jointPlan,
    input: { lengthFt: 60, widthFt: 40, thicknessIn: 6 },
    numbers: { lengthFt: 'positive', widthFt: 'positive', thicknessIn: 'positive' },
    optional: ['spacingFactor', 'capFt', 'maxAspect'],
    choices: ['baysAlongLengthFt', 'baysAlongWidthFt'],
  },
  sawsForWindow: {
    calculate: engine.sawsForWindow,
    input: { sawFt: 1_000, feetPerHour: 200, windowHours: 4 },
    numbers: { sawFt: 'zero', feetPerHour: 'positive', windowHours: 'positive' },
  },
  slurry: {
    calculate: engine.slurry,
    input: { inchFeet: 612, kerfIn: 0.2, gallonsPerMinute: 3, minutes: 90 },
    numbers: { inchFeet: 'zero', kerfIn: 'positive', gallonsPerMinute: 'zero', minutes: 'zero' },
  },
  spoil: {
    calculate: engine.spoil,
    input: { cuFt: 27 },
    numbers: { cuFt: 'zero' },
    optional: ['densityPcf', 'bulking'],
  },
  lipTreatment: {
    calculate: engine.lipTreatment,
    input: { heightIn: 1 },
    numbers: { heightIn: 'positive' },
    optional: ['runPerRise'],
  },
  batteryPacks: {
    calculate: engine.batteryPacks,
    input: { inchFeet: 60, inchFeetPerPack: 25 },
    numbers: { inchFeet: 'zero', inchFeetPerPack: 'positive' },
  },
  'batteryPacks by units': {
    calculate: engine.batteryPacks,
    input: { units: 45, unitsPerPack: 30 },
    numbers: { unitsPerPack: 'positive' },
    optional: ['units'],
  },
  generatorKw: {
    calculate: engine.generatorKw,
    input: { volts: 480, amps: 30, phases: 3 },
    numbers: { volts: 'positive', amps: 'positive' },
    optional: ['powerFactor', 'loadFraction', 'startFactor'],
    choices: ['phases'],
  },
  earliestDigDate: {
    calculate: engine.earliestDigDate,
    input: { notifiedOn: '2026-12-02', fullBusinessDays: 2, holidays: [] },
    numbers: { fullBusinessDays: 'positive' },
    choices: ['notifiedOn', 'holidays'],
  },
  crewHours: {
    calculate: engine.crewHours,
    input: {
      travelHours: 1,
      orientationHours: 0,
      setUpHours: 1,
      sawingHours: 4,
      moveHours: 0.5,
      breakingHours: 0,
      loadingHours: 0,
      cleaningHours: 0.5,
    },
    numbers: {
      travelHours: 'zero',
      orientationHours: 'zero',
      setUpHours: 'zero',
      sawingHours: 'zero',
      moveHours: 'zero',
      breakingHours: 'zero',
      loadingHours: 'zero',
      cleaningHours: 'zero',
    },
  },
  concreteOrderCuYd: {
    calculate: engine.concreteOrderCuYd,
    input: { cuYd: 3, wastePct: 10 },
    numbers: { cuYd: 'positive', wastePct: 'zero' },
  },
  sawingHours: {
    calculate: engine.sawingHours,
    input: { method: 'flat_saw', quantity: 100 },
    numbers: { quantity: 'zero' },
    optional: ['companyPerHour'],
    choices: ['method'],
  },
  coringHours: {
    calculate: engine.coringHours,
    input: { holes: 4, diameterIn: 4, depthIn: 8 },
    numbers: { holes: 'zero', diameterIn: 'positive', depthIn: 'positive' },
    optional: ['companyInchesPerMinute', 'companySetUpMinutes'],
  },
  toolWear: {
    calculate: engine.toolWear,
    input: { quantity: 100, quantityPerTool: 4_000, toolCents: 60_000 },
    numbers: { quantity: 'zero', quantityPerTool: 'positive', toolCents: 'zero' },
  },
  priceCuts: {
    calculate: engine.priceCuts,
    input: {
      lines: [{ id: 1, trip: 1, quantity: 100, unit: 'ft', rate: 100, factors: [150] }],
      extras: [{ id: 'x', trip: 1, cents: 100 }],
      minimumCents: 1,
      mobilizationCents: 1,
    },
    numbers: {
      minimumCents: 'zero',
      mobilizationCents: 'zero',
      'lines[0].quantity': 'zero',
      'lines[0].rate': 'zero',
      'lines[0].factors[0]': 'positive',
      'extras[0].cents': 'zero',
    },
    optional: ['factorCapPct'],
    choices: [
      'lines',
      'extras',
      'lines[0].id',
      'lines[0].trip',
      'lines[0].unit',
      'minimumIncludesMobilization',
    ],
  },
  tabulateBids: {
    calculate: engine.tabulateBids,
    input: { rows: [{ id: 'a', plugCents: 1 }], bids: [{ id: 'b', baseCents: 1, answers: {} }] },
    numbers: { 'rows[0].plugCents': 'zero', 'bids[0].baseCents': 'zero' },
    choices: ['rows', 'bids', 'bids[0].id', 'bids[0].answers'],
  },
  depthSection: {
    calculate: engine.depthSection,
    input: { element: 'slab', thicknessIn: 8, passDepthsIn: [1, 4], beyond: 'soil' },
    numbers: { thicknessIn: 'positive', 'passDepthsIn[0]': 'positive' },
    choices: ['element', 'beyond', 'passDepthsIn', 'mats', 'embedded'],
  },
  silicaControls: {
    calculate: engine.silicaControls,
    input: [{ tool: 'jackhammer', place: 'indoors', hours: 1 }],
    numbers: { 'tasks[0].hours': 'zero' },
    choices: ['tasks[0].tool', 'tasks[0].place'],
  },
  noiseExposure: {
    calculate: engine.noiseExposure,
    input: [{ dba: 90, hours: 1 }],
    numbers: { 'exposures[0].dba': 'zero', 'exposures[0].hours': 'zero' },
  },
  handArmVibration: {
    calculate: engine.handArmVibration,
    input: [{ mps2: 5, hours: 1 }],
    numbers: { 'exposures[0].mps2': 'zero', 'exposures[0].hours': 'zero' },
  },
};

describeRefusals(subjects);

describe('lists', () => {
  it.each([
    ['silicaControls', engine.silicaControls, 'tasks'],
    ['noiseExposure', engine.noiseExposure, 'exposures'],
    ['handArmVibration', engine.handArmVibration, 'exposures'],
  ])('%s refuses a million entries', (_name, calculate, field) => {
    const entries = Array.from({ length: 1_000_000 }, () => ({}));
    expect(errorOf(() => (calculate as (list: unknown) => unknown)(entries))).toMatchObject({ field });
  });
});

describe('limits between fields', () => {
  it('an overlap of the whole bit, and a run shorter than the bit', () => {
    const run = { lengthIn: 40, bitDiameterIn: 4, overlapIn: 4, closed: true, depthIn: 8 };
    expect(errorOf(() => engine.stitchHoles(run))).toMatchObject({ field: 'overlapIn' });
    expect(errorOf(() => engine.stitchHoles({ ...run, overlapIn: 1, lengthIn: 3 }))).toMatchObject({
      field: 'lengthIn',
    });
  });

  it('a blade whose radius the cut reaches', () => {
    expect(
      errorOf(() => engine.overcutIn({ bladeDiameterIn: 18, thicknessIn: 8, passThroughIn: 1 })),
    ).toMatchObject({
      field: 'bladeDiameterIn',
      allowed: 'over 18 in to cut 8 in with 1 in through',
    });
  });

  it('a sloped trench deeper than its table', () => {
    expect(errorOf(() => engine.slopedTrench({ bottomWidthFt: 3, depthFt: 21, soil: 'C' }))).toMatchObject({
      field: 'depthFt',
    });
  });

  it('battery work given twice or not at all', () => {
    expect(errorOf(() => engine.batteryPacks({} as never))).toMatchObject({ field: 'inchFeet' });
    expect(
      errorOf(() => engine.batteryPacks({ inchFeet: 1, inchFeetPerPack: 1, units: 1, unitsPerPack: 1 })),
    ).toMatchObject({ field: 'units' });
  });

  it('a date that is none', () => {
    const dig = { fullBusinessDays: 2, holidays: [] };
    for (const notifiedOn of ['2026-02-30', '2026-13-01', '26-01-01', '2026-01-01T00:00:00Z', '']) {
      expect(errorOf(() => engine.earliestDigDate({ ...dig, notifiedOn }))).toMatchObject({
        field: 'notifiedOn',
      });
    }
    expect(
      errorOf(() => engine.earliestDigDate({ ...dig, notifiedOn: '2026-12-02', holidays: ['x'] })),
    ).toMatchObject({
      field: 'holidays[0]',
    });
  });
});
