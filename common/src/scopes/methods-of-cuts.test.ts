import { describe, expect, it } from 'vitest';
import { cutSchema, methodsOfCuts, type CutInput } from './index.ts';

const cuts = (...inputs: CutInput[]) => inputs.map((input) => cutSchema.parse(input));

describe('methods a cut list is commonly done by', () => {
  it.each([
    ['a deep floor line', 'floor', [{ kind: 'line', lengthFt: 10, depthIn: 10, count: 1 }], ['flat_saw']],
    [
      'a shallow wall line',
      'wall',
      [{ kind: 'line', lengthFt: 10, depthIn: 4, count: 1 }],
      ['wall_saw', 'hand_saw'],
    ],
    ['cores alone', 'ceiling', [{ kind: 'core', diameterIn: 4, depthIn: 8, count: 2 }], ['core_drill']],
    [
      'an opening with cored corners',
      'wall',
      [{ kind: 'opening', lengthFt: 4, widthFt: 7, thicknessIn: 12, corners: 'cored', count: 1 }],
      ['wall_saw', 'core_drill'],
    ],
    [
      'a mixed list, each method once',
      'floor',
      [
        { kind: 'core', diameterIn: 4, depthIn: 8, count: 2 },
        { kind: 'trench', lengthFt: 40, widthFt: 2, thicknessIn: 6, count: 1 },
        { kind: 'line', lengthFt: 10, depthIn: 5, count: 1 },
      ],
      ['flat_saw', 'hand_saw', 'core_drill'],
    ],
  ] as const)('%s', (_, face, inputs, expected) => {
    expect(methodsOfCuts(cuts(...inputs), { face })).toEqual(expected);
  });
});
