import { describe, expect, it } from 'vitest';
import { describeRefusals, errorOf, type Subject } from '../../../test/engine-refusals.ts';
import * as engine from '../index.ts';

const removal = { densityPcf: 150, maxPieceLb: 500 };
const count = { count: 'positive' } as const;

function cutSubject(input: engine.Cut, numbers: Subject['numbers'], rest: Partial<Subject> = {}): Subject {
  return {
    calculate: engine.takeoffCut,
    input,
    numbers: { ...numbers, ...count },
    choices: ['kind'],
    ...rest,
  };
}

const subjects: Readonly<Record<string, Subject>> = {
  inchFeet: {
    calculate: engine.inchFeet,
    input: { lengthFt: 1, depthIn: 1 },
    numbers: { lengthFt: 'positive', depthIn: 'positive' },
  },
  'takeoffCut line': cutSubject(
    { kind: 'line', lengthFt: 1, depthIn: 1, count: 1 },
    { lengthFt: 'positive', depthIn: 'positive' },
  ),
  'takeoffCut trench': cutSubject(
    { kind: 'trench', lengthFt: 9, widthFt: 2, thicknessIn: 6, endCuts: 2, count: 1, removal },
    {
      lengthFt: 'positive',
      widthFt: 'positive',
      thicknessIn: 'positive',
      'removal.densityPcf': 'positive',
      'removal.maxPieceLb': 'positive',
    },
    {
      optional: ['bladeDiameterIn', 'removal.allowancePct', 'removal.maxSideFt', 'removal.maxShortSideFt'],
      choices: ['kind', 'endCuts', 'sideCuts'],
    },
  ),
  'takeoffCut opening': cutSubject(
    {
      kind: 'opening',
      lengthFt: 3,
      widthFt: 7,
      thicknessIn: 8,
      corners: 'overcut',
      bladeDiameterIn: 24,
      passThroughIn: 1,
      count: 1,
    },
    { lengthFt: 'positive', widthFt: 'positive', thicknessIn: 'positive' },
    { optional: ['bladeDiameterIn', 'passThroughIn'], choices: ['kind', 'corners'] },
  ),
  'takeoffCut core': cutSubject(
    { kind: 'core', diameterIn: 4, depthIn: 8, count: 1 },
    { diameterIn: 'positive', depthIn: 'positive' },
  ),
  'takeoffCut stitch': cutSubject(
    { kind: 'stitch', lengthIn: 40, bitDiameterIn: 4, overlapIn: 1, closed: true, depthIn: 8, count: 1 },
    { lengthIn: 'positive', bitDiameterIn: 'positive', overlapIn: 'zero', depthIn: 'positive' },
    { choices: ['kind', 'closed'] },
  ),
  'takeoffCut joints': cutSubject(
    { kind: 'joints', lengthFt: 60, widthFt: 40, thicknessIn: 6, spacingFactor: 30, capFt: 15, count: 1 },
    {
      lengthFt: 'positive',
      widthFt: 'positive',
      thicknessIn: 'positive',
      spacingFactor: 'positive',
      capFt: 'positive',
    },
  ),
  'takeoffCut wire': cutSubject(
    { kind: 'wire', areaSqFt: 10, pilotCores: 2, pilotDiameterIn: 2, depthIn: 24, count: 1 },
    { areaSqFt: 'positive', pilotCores: 'zero', pilotDiameterIn: 'positive', depthIn: 'positive' },
  ),
  'takeoffCut curb': cutSubject(
    { kind: 'curb', lengthFt: 10, heightIn: 6, count: 1 },
    { lengthFt: 'positive', heightIn: 'positive' },
  ),
  'takeoffCut chase': cutSubject(
    { kind: 'chase', lengthFt: 10, widthIn: 1, depthIn: 1, count: 1 },
    { lengthFt: 'positive', widthIn: 'positive', depthIn: 'positive' },
  ),
  'takeoffCut block': cutSubject(
    { kind: 'block', cutLengthIn: 8, depthIn: 8, count: 1 },
    { cutLengthIn: 'positive', depthIn: 'positive' },
  ),
  'takeoffCut pipe': cutSubject(
    { kind: 'pipe', outsideDiameterIn: 8, count: 1 },
    { outsideDiameterIn: 'positive' },
  ),
  'takeoffCut bar': cutSubject({ kind: 'bar', diameterIn: 0.625, count: 1 }, { diameterIn: 'positive' }),
  'takeoffCut lip': cutSubject(
    { kind: 'lip', widthFt: 4, heightIn: 1, runPerRise: 12, count: 1 },
    { widthFt: 'positive', heightIn: 'positive', runPerRise: 'positive' },
  ),
};

describeRefusals(subjects);

describe('lists', () => {
  const line: engine.Cut = { kind: 'line', lengthFt: 10, depthIn: 6, count: 1 };

  it('a million cuts are refused at once, by name', () => {
    const cuts = Array.from({ length: 1_000_000 }, () => line);
    const started = performance.now();
    const error = errorOf(() => engine.takeoffCutList({ cuts }));
    expect(performance.now() - started).toBeLessThan(50);
    expect(error).toMatchObject({ field: 'cuts', allowed: 'a list of at most 10,000' });
  });

  it('an unknown kind of cut is named', () => {
    const error = errorOf(() => engine.takeoffCut({ ...line, kind: 'notch' } as unknown as engine.Cut));
    expect(error).toMatchObject({ field: 'kind', given: 'notch' });
  });
});
