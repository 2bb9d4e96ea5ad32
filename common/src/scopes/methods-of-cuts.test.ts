import { describe, expect, it } from 'vitest';
import { methods } from '../people/index.ts';
import {
  cutSchema,
  methodFits,
  methodsOfCuts,
  methodVerdicts,
  readCutList,
  type CutInput,
  type CutPlace,
} from './index.ts';

const cuts = (...inputs: CutInput[]) => inputs.map((input) => cutSchema.parse(input));
const outside: CutPlace = {
  face: 'floor',
  below: 'soil',
  indoors: false,
  enginesAllowed: true,
  overcutsAllowed: true,
};
const line: CutInput = { kind: 'line', lengthFt: 10, depthIn: 10, count: 1 };
const opening: CutInput = {
  kind: 'opening',
  lengthFt: 4,
  widthFt: 7,
  thicknessIn: 12,
  corners: 'overcut',
  count: 1,
};

describe('methods a cut list can be done by', () => {
  it('are the core drill alone for cores', () => {
    expect(methodsOfCuts(cuts({ kind: 'core', diameterIn: 4, depthIn: 8, count: 2 }), outside)).toEqual([
      'core_drill',
    ]);
  });

  it('reach the depth: 10 in of floor is too deep for a hand saw, and for an electric flat saw indoors', () => {
    expect(methodsOfCuts(cuts(line), outside)).toEqual(expect.arrayContaining(['flat_saw', 'wall_saw']));
    expect(methodsOfCuts(cuts(line), outside)).not.toContain('hand_saw');
    expect(methodsOfCuts(cuts(line), { ...outside, indoors: true })).not.toContain('flat_saw');
  });

  it('keep round blades out of corners that must not be overcut, unless the corners are cored', () => {
    const wall: CutPlace = { ...outside, face: 'wall', overcutsAllowed: false };
    expect(methodsOfCuts(cuts(opening), wall)).not.toContain('wall_saw');
    expect(methodsOfCuts(cuts({ ...opening, corners: 'cored' }), wall)).toEqual(
      expect.arrayContaining(['wall_saw', 'core_drill']),
    );
  });

  it('are listed once each for a mixed list', () => {
    const found = methodsOfCuts(
      cuts(line, line, { kind: 'core', diameterIn: 4, depthIn: 8, count: 2 }),
      outside,
    );
    expect(new Set(found).size).toBe(found.length);
    expect(found).toEqual(methods.filter((method) => found.includes(method)));
    expect(found).toContain('core_drill');
  });

  it('reach a joint’s own depth, a curb’s height and a bar’s thickness', () => {
    const joints: CutInput = { kind: 'joints', lengthFt: 60, widthFt: 40, thicknessIn: 6, count: 1 };
    expect(methodsOfCuts(cuts(joints), outside)).toEqual(['flat_saw', 'joint_saw']);
    expect(methodsOfCuts(cuts({ kind: 'bar', diameterIn: 1, count: 4 }), outside)).toEqual(['hand_saw']);
    // A block of 8 in is turned over: 6 in of reach from either face.
    expect(methodsOfCuts(cuts({ kind: 'block', cutLengthIn: 16, depthIn: 8, count: 4 }), outside)).toEqual([
      'hand_saw',
    ]);
  });

  it('let a wire with its pilots be cut only where the far face is reached', () => {
    const wire: CutInput = {
      kind: 'wire',
      areaSqFt: 40,
      pilotCores: 2,
      pilotDiameterIn: 2,
      depthIn: 36,
      count: 1,
    };
    expect(methodsOfCuts(cuts(wire), { ...outside, below: 'unoccupied' })).toEqual([
      'wire_saw',
      'core_drill',
    ]);
    expect(methodsOfCuts(cuts(wire), outside)).toEqual([...methods]);
  });

  it('are all of them where no machine fits', () => {
    const giant = cuts({ kind: 'core', diameterIn: 96, depthIn: 8, count: 1 });
    expect(methodsOfCuts(giant, outside)).toEqual([...methods]);
  });
});

describe('what every method can do of a cut list', () => {
  const fitsOf = (list: CutInput[], place: CutPlace) =>
    methodFits(cuts(...list).map((cut) => methodVerdicts(cut, place)));

  it('names the cuts each reason and each caution is about', () => {
    const core: CutInput = { kind: 'core', diameterIn: 4, depthIn: 8, count: 2 };
    const fits = fitsOf([line, core, { ...line, depthIn: 3 }], outside);
    expect(fits.map(({ method }) => method)).toEqual([...methods]);
    expect(fits.find(({ method }) => method === 'hand_saw')).toEqual({
      method: 'hand_saw',
      fits: [2],
      reasons: [
        { text: 'Reaches 6 in; the cut is 10 in.', cuts: [0] },
        { text: 'Not a tool for this kind of cut.', cuts: [1] },
      ],
      cautions: [{ text: 'Kickback: two hands, sure footing, guard down.', cuts: [2] }],
    });
  });

  it('say the same as what crews are matched by', () => {
    const list: CutInput[] = [line, { ...opening, corners: 'cored' }];
    const wall: CutPlace = { ...outside, face: 'wall', overcutsAllowed: false };
    const fitting = fitsOf(list, wall).filter(({ fits }) => fits.length > 0);
    expect(fitting.map(({ method }) => method)).toEqual(methodsOfCuts(cuts(...list), wall));
    expect(fitting.find(({ method }) => method === 'core_drill')?.cautions).toEqual([
      { text: 'For the corner cores only.', cuts: [1] },
    ]);
  });
});

describe('joints between column lines', () => {
  const slab = { kind: 'joints', lengthFt: 60, widthFt: 40, thicknessIn: 6, count: 1 } as const;
  const read = (cut: CutInput) =>
    readCutList([
      { id: '018f3a1e-0000-7000-8000-000000000001', mark: 'J1', note: '', cut: cutSchema.parse(cut) },
    ]);

  it('fall on every bay line: 25 + 35 ft takes 2 + 3 panels, where 60 ft alone takes 4', () => {
    // Along the width 40 ft takes 3 panels: 2 joints of 60 ft beside 3 or 4 joints of 40 ft.
    const plain = read(slab);
    const inBays = read({ ...slab, baysAlongLengthFt: [25, 35] });
    expect(plain.ok && plain.totals.sawFt).toBe(3 * 40 + 2 * 60);
    expect(inBays.ok && inBays.totals.sawFt).toBe(4 * 40 + 2 * 60);
  });

  it('are refused beside the bays where these do not make up the side', () => {
    const reading = read({ ...slab, baysAlongWidthFt: [20, 25] });
    expect(reading.ok).toBe(false);
    expect(!reading.ok && reading.issues[0]?.path).toBe('cuts.0.cut.baysAlongWidthFt');
  });
});
