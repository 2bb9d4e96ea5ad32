import {
  commonKerfIn,
  depthSection,
  explain,
  handArmVibration,
  noiseExposure,
  passPlan,
  silicaControls,
  silicaTools,
  slingTension,
  slurry,
  waterGallonsPerMinute,
  workPlaces,
  type DepthSectionInput,
  type SilicaTool,
} from '@kerfyard/common/cutting';
import type { Conditions, CutLine } from '@kerfyard/common/scopes';
import { DepthSection } from '../../components/depth-section.tsx';
import {
  choiceField,
  defineCalculator,
  numberField,
  optionalNumber,
  rowsField,
  switchField,
  type Calculator,
  type ResultBlock,
  type ResultFigure,
  type ValuesOf,
} from '../calculators/calculator.ts';
import { renamed, stepsOf } from '../calculators/evaluate.ts';
import {
  bladeFor,
  hasBladeTable,
  hoursByTool,
  settingsOf,
  sheetCuts,
  type Setting,
  type SheetCut,
} from './work-by-method.ts';

interface SheetInput {
  readonly cuts: readonly CutLine[];
  readonly conditions: Conditions;
}

/** Water by the tool that runs it; the table names four, the others drink about as the one beside them. */
const waterOf = (tool: SilicaTool): keyof typeof waterGallonsPerMinute.rows => {
  if (tool === 'core_rig') return 'core';
  if (tool === 'walk_behind_saw') return 'flat';
  return tool === 'handheld_power_saw' ? 'hand' : 'wall';
};

/**
 * The job sheet of a visit, described like a calculator: what is planned (hours, levels, slings) is typed and kept in
 * the address, the rest comes from the subcontract's cuts and conditions by the engine.
 */
export function jobSheet({ cuts: lines, conditions }: SheetInput): Calculator {
  const cuts = sheetCuts(lines, conditions);
  const settings = settingsOf(cuts);
  const hours = [...hoursByTool(cuts, conditions)];
  const place = conditions.indoors ? 'indoors' : 'outdoors';
  const fields = {
    scoreIn: numberField('in', 0.5),
    maxPassIn: numberField('in', 1.25),
    tasks: rowsField(
      {
        tool: choiceField(silicaTools, 'handheld_power_saw'),
        place: choiceField(workPlaces, place),
        hours: numberField('h', 0),
      },
      hours.map(([tool, planned]) => [tool, place, planned]),
      { minRows: 0 },
    ),
    exposures: rowsField(
      {
        tool: choiceField(silicaTools, 'handheld_power_saw'),
        dba: optionalNumber('dBA', null),
        mps2: optionalNumber('m/s²', null),
        hours: numberField('h', 0),
      },
      hours.map(([tool, planned]) => [tool, '', '', planned]),
      { minRows: 0 },
    ),
    legs: numberField('', 2),
    angleDeg: numberField('°', 60),
    equalized: switchField(false),
  };
  type Values = ValuesOf<typeof fields>;
  const section = (values: Values) => deepestSection(cuts, settings, conditions, values);
  return defineCalculator({
    name: 'jobSheet',
    fields,
    sections: [
      { name: 'passes', fields: ['scoreIn', 'maxPassIn'] },
      { name: 'tasks', fields: ['tasks'] },
      { name: 'exposures', fields: ['exposures'] },
      { name: 'slings', fields: ['legs', 'angleDeg', 'equalized'] },
    ],
    cautions: cautionsOf(cuts, conditions),
    compute: (values) => {
      const drawn = section(values);
      if (drawn !== null) renamed({ passDepthsIn: 'maxPassIn' }, () => depthSection(drawn));
      return {
        blocks: [
          ...settings.map((setting) => settingBlock(setting, values)),
          ...dustBlocks(values.tasks),
          ...exposureBlocks(values.exposures),
          ...liftBlocks(cuts, values),
          waterBlock(cuts, values.tasks),
        ],
        cautions: [...new Set(cuts.flatMap(({ takeoff }) => takeoff.cautions))],
      };
    },
    draw: (values) => {
      const drawn = section(values);
      return drawn === null ? undefined : <DepthSection section={drawn} />;
    },
  });
}

/** The deepest cut through something whose thickness is known, as it will be cut. */
function deepestSection(
  cuts: readonly SheetCut[],
  settings: readonly Setting[],
  { face, below }: Conditions,
  { scoreIn, maxPassIn }: { scoreIn: number; maxPassIn: number },
): DepthSectionInput | null {
  for (const { marks, depthIn } of settings) {
    const thick = cuts.find(({ line }) => marks.includes(line.mark) && 'thicknessIn' in line.cut);
    if (thick === undefined || !('thicknessIn' in thick.line.cut)) continue;
    return {
      element: face === 'wall' ? 'wall' : 'slab',
      thicknessIn: thick.line.cut.thicknessIn,
      passDepthsIn: passesTo(depthIn, { scoreIn, maxPassIn }).depthsIn,
      beyond: below,
    };
  }
  return null;
}

/** A cut shallower than the score is one pass. */
function passesTo(depthIn: number, { scoreIn, maxPassIn }: { scoreIn: number; maxPassIn: number }) {
  return passPlan({
    depthIn,
    maxPassIn,
    scoreIn: depthIn < scoreIn ? Math.min(depthIn, maxPassIn) : scoreIn,
  });
}

function settingBlock(setting: Setting, values: { scoreIn: number; maxPassIn: number }): ResultBlock {
  const plan = passesTo(setting.depthIn, values);
  const blade = bladeFor(setting);
  const reach = blade === null ? null : explain.bladeReachIn(blade);
  const bladeFigures: ResultFigure[] =
    blade === null || reach === null
      ? hasBladeTable(setting.method)
        ? [{ name: 'blade', value: { word: 'jobSheet.noBlade' }, unit: '', isOver: true, isWide: true }]
        : []
      : [
          { name: 'blade', value: blade.diameterIn, unit: 'in' },
          { name: 'reachIn', value: Number(reach.value), unit: 'in', digits: 3, working: [reach] },
        ];
  return {
    heading: [...setting.marks, { word: `options.method.${setting.method}` }],
    figures: [
      { name: 'depthIn', value: setting.depthIn, unit: 'in', digits: 3, isLead: true },
      { name: 'passes', value: plan.depthsIn.length, unit: '', working: plan.working },
      ...bladeFigures,
    ],
  };
}

type Tasks = readonly { tool: SilicaTool; place: (typeof workPlaces)[number]; hours: number }[];

function dustBlocks(tasks: Tasks): readonly ResultBlock[] {
  if (tasks.length === 0) return [];
  const shift = silicaControls(tasks);
  const combined = stepsOf(shift.working, 'Hours of listed tasks together');
  return shift.tasks.map((task, index): ResultBlock => {
    const planned = tasks[index];
    return {
      heading: [
        { word: 'jobSheet.dust' },
        { word: `options.tool.${task.tool}` },
        { word: `options.place.${planned?.place ?? 'outdoors'}` },
        `${planned?.hours ?? 0} h`,
      ],
      text: task.note === '' ? [task.control] : [task.control, task.note],
      figures: [
        {
          name: 'respirator',
          value:
            task.apf === null
              ? { word: 'dust.notCovered' }
              : task.apf === 0
                ? { word: 'dust.none' }
                : `APF ${task.apf}`,
          unit: '',
          working: [...combined, ...shift.working.slice(index + 1, index + 2)],
          isOver: task.apf === null,
        },
      ],
    };
  });
}

interface Exposure {
  tool: SilicaTool;
  dba: number | undefined;
  mps2: number | undefined;
  hours: number;
}

/** What the shift comes to, and how long each tool alone may run before a limit; nothing without a level. */
function exposureBlocks(exposures: readonly Exposure[]): readonly ResultBlock[] {
  const heard = exposures.flatMap(({ dba, hours }) => (dba === undefined ? [] : [{ dba, hours }]));
  const felt = exposures.flatMap(({ mps2, hours }) => (mps2 === undefined ? [] : [{ mps2, hours }]));
  if (heard.length === 0 && felt.length === 0) return [];
  const noise = noiseExposure(heard);
  const vibration = handArmVibration(felt);
  const figures: ResultFigure[] = [];
  if (heard.length > 0) {
    figures.push({
      name: 'constructionSum',
      value: noise.constructionSum ?? { word: 'noiseAndVibration.atOnce' },
      unit: '',
      digits: 2,
      working: stepsOf(noise.working, 'Construction sum'),
      isOver: noise.constructionExceeded,
    });
  }
  if (felt.length > 0) {
    figures.push({
      name: 'points',
      value: vibration.points,
      unit: 'points',
      digits: 0,
      working: stepsOf(vibration.working, 'Points'),
      isOver: vibration.aboveActionValue,
    });
  }
  return [{ name: 'shift', figures }, ...exposures.flatMap(budgetBlock)];
}

function budgetBlock({ tool, dba, mps2, hours }: Exposure): readonly ResultBlock[] {
  const figures: ResultFigure[] = [];
  if (dba !== undefined) {
    const hour = noiseExposure([{ dba, hours: 1 }]);
    const sum = hour.constructionSum;
    if (sum !== 0) {
      figures.push({
        name: 'noiseHours',
        value: sum === null ? 0 : 1 / sum,
        unit: 'h',
        digits: 2,
        working: stepsOf(hour.working, 'Construction sum'),
        isOver: sum === null || hours > 1 / sum,
      });
    }
  }
  if (mps2 !== undefined && mps2 > 0) {
    const hour = handArmVibration([{ mps2, hours: 1 }]);
    const toAction = actionPoints / hour.points;
    figures.push({
      name: 'vibrationHours',
      value: toAction,
      unit: 'h',
      digits: 2,
      working: stepsOf(hour.working, 'Points'),
      isOver: hours > toAction,
    });
  }
  if (figures.length === 0) return [];
  return [{ heading: [{ word: 'jobSheet.budget' }, { word: `options.tool.${tool}` }], figures }];
}

/** 2.5 m/s² over eight hours, Directive 2002/44/EC, in points of 2a²T. */
const actionPoints = 100;

interface Slings {
  legs: number;
  angleDeg: number;
  equalized: boolean;
}

/** Pieces and cores by the weight that hangs or falls. */
function liftBlocks(cuts: readonly SheetCut[], slings: Slings): readonly ResultBlock[] {
  return cuts.flatMap(({ line, takeoff }): readonly ResultBlock[] => {
    const { cut, mark } = line;
    if (cut.kind === 'core') {
      const weight = explain.coreWeightLb({ diameterIn: cut.diameterIn, lengthIn: cut.depthIn });
      const value = Number(weight.value);
      return [
        {
          heading: [mark, { word: 'jobSheet.cores' }],
          figures: [{ name: 'coreLb', value, unit: 'lb', digits: 0, working: [weight] }],
        },
      ];
    }
    if (cut.kind !== 'opening' && cut.kind !== 'trench') return [];
    return [pieceBlock(mark, takeoff, slings)];
  });
}

function pieceBlock(mark: string, takeoff: SheetCut['takeoff'], slings: Slings): ResultBlock {
  const { pieces, removedLb, count, working } = takeoff;
  const heading = [mark, { word: 'jobSheet.pieces' }];
  if (pieces === null) {
    // Nobody has said how it comes out, so nothing is said about a lift.
    const weights = working.filter(({ unit }) => unit === 'lb');
    return {
      heading,
      figures: [{ name: 'uncutLb', value: removedLb, unit: 'lb', digits: 0, working: weights, isWide: true }],
    };
  }
  const tension = slingTension({ loadLb: pieces.weightLb, ...slings });
  return {
    heading,
    figures: [
      { name: 'pieces', value: pieces.count * count, unit: '' },
      {
        name: 'pieceLb',
        value: pieces.weightLb,
        unit: 'lb',
        digits: 0,
        working: working.filter(({ label, unit }) => label === 'Cross cuts of one' || unit === 'lb'),
      },
      {
        name: 'perLegLb',
        value: tension.perLegLb,
        unit: 'lb',
        digits: 0,
        working: tension.working,
        isOver: tension.belowMinimumAngle,
      },
    ],
  };
}

/** Water and slurry of the planned hours, as if the water ran all the time. */
function waterBlock(cuts: readonly SheetCut[], tasks: Tasks): ResultBlock {
  const gallons = tasks.reduce(
    (sum, { tool, hours }) => sum + waterGallonsPerMinute.rows[waterOf(tool)] * hours * 60,
    0,
  );
  const wet = slurry({
    inchFeet: cuts.reduce((sum, { takeoff }) => sum + takeoff.inchFeet, 0),
    kerfIn: commonKerfIn.rows,
    // All of it at once: the engine asks for a flow and its minutes.
    gallonsPerMinute: 1,
    minutes: gallons,
  });
  return {
    name: 'water',
    figures: [
      { name: 'waterGal', value: wet.waterGal, unit: 'gal', digits: 0 },
      {
        name: 'drums',
        value: wet.drums,
        unit: '× 55 gal',
        working: stepsOf(wet.working, 'Solids', 'Slurry', 'Drums'),
      },
    ],
  };
}

function cautionsOf(cuts: readonly SheetCut[], conditions: Conditions): readonly string[] {
  const kinds = new Set(cuts.map(({ line }) => line.cut.kind));
  const hasPieces = kinds.has('opening') || kinds.has('trench');
  const isOpenBelow = conditions.face !== 'floor' || conditions.below !== 'soil';
  const methods = new Set(cuts.map(({ method }) => method));
  const shown: readonly (string | false)[] = [
    conditions.postTension !== 'proved_none' && 'tendon',
    conditions.below === 'unknown' && 'below_unknown',
    (conditions.indoors || !conditions.enginesAllowed) && 'carbon_monoxide',
    'structure',
    'embedded',
    isOpenBelow && hasPieces && 'falling_pieces',
    isOpenBelow && kinds.has('core') && 'falling_cores',
    isOpenBelow && hasPieces && 'open_edges',
    hasPieces && 'qualified_rigger',
    conditions.below === 'soil' && kinds.has('trench') && 'trench_edges',
    methods.has('hand_saw') && 'kickback',
    methods.has('wire_saw') && 'wire_whip',
    'silica_deputy',
    'hearing',
    'vibration_watch',
    'wet_electrics',
    'slurry',
  ];
  return shown.filter((key) => key !== false);
}
