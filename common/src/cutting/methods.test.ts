import { describe, expect, it } from 'vitest';
import { cutKinds, cuttingMethods, methodsFor, type CuttingMethod, type MethodsInput } from './index.ts';

const door: MethodsInput = {
  work: 'opening',
  depthIn: 8,
  face: 'wall',
  indoors: true,
  enginesAllowed: false,
  overcutsAllowed: true,
  bothFacesReachable: true,
};

function verdict(method: CuttingMethod, overrides: Partial<MethodsInput> = {}) {
  const found = methodsFor({ ...door, ...overrides }).find((candidate) => candidate.method === method);
  if (found === undefined) throw new Error(`${method} is missing`);
  return found;
}

const allowed = (overrides: Partial<MethodsInput> = {}) =>
  methodsFor({ ...door, ...overrides })
    .filter(({ ok }) => ok)
    .map(({ method }) => method);

// Depths, doorways and floor loads here are common practice, no source.
describe('methodsFor', () => {
  it('names every method once, with a reason for each no and none for a yes', () => {
    for (const work of cutKinds) {
      for (const face of ['floor', 'wall', 'ceiling'] as const) {
        const verdicts = methodsFor({ ...door, work, face });
        expect(verdicts.map(({ method }) => method)).toEqual([...cuttingMethods]);
        for (const { ok, reasons } of verdicts) expect(reasons.length > 0).toBe(!ok);
      }
    }
  });

  it('offers something for every kind of cut in a thin floor', () => {
    for (const work of cutKinds) expect(allowed({ work, face: 'floor', depthIn: 3 }), work).not.toEqual([]);
  });

  it('a flat saw stays on the floor, a joint saw at joints, a core drill at cores', () => {
    expect(verdict('flat_saw').reasons.join()).toContain('floor only');
    expect(verdict('joint_saw').ok).toBe(false);
    expect(verdict('core_drill').ok).toBe(false);
    expect(allowed({ work: 'core', diameterIn: 4 })).toEqual(['core_drill']);
    expect(allowed({ work: 'joints', face: 'floor', depthIn: 1.5 })).toEqual(['flat_saw', 'joint_saw']);
  });

  it('without overcuts an opening is left to tools that cut square, or to cored corners', () => {
    expect(allowed({ overcutsAllowed: false })).toEqual(['chain_saw', 'wire_saw', 'stitch_drill']);
    expect(verdict('wall_saw', { overcutsAllowed: false }).reasons.join()).toContain('cored');
    // A straight line has no corner.
    expect(verdict('wall_saw', { work: 'line', overcutsAllowed: false }).ok).toBe(true);
  });

  it('depth rules methods out, and both faces let some in again', () => {
    expect(verdict('hand_saw', { bothFacesReachable: false }).reasons.join()).toContain('Reaches 6 in');
    const both = verdict('hand_saw');
    expect(both.ok).toBe(true);
    expect(both.cautions.join()).toContain('both faces');
    expect(verdict('hand_saw', { depthIn: 12.1 }).ok).toBe(false);
    expect(verdict('wall_saw', { depthIn: 18, bothFacesReachable: false }).ok).toBe(true);
    expect(verdict('wall_saw', { depthIn: 18.1, bothFacesReachable: false }).ok).toBe(false);
  });

  // Concrete trade press: a wire needs the back side; else a 3½-ft wall is stitch drilled.
  it('a wire needs the far face; without it a very thick wall is stitch drilled', () => {
    expect(allowed({ depthIn: 42, bothFacesReachable: false })).toEqual(['stitch_drill']);
    expect(verdict('wire_saw', { depthIn: 42 }).ok).toBe(true);
    expect(verdict('wire_saw', { depthIn: 8 }).cautions.join()).toContain('Thin');
  });

  it('without engines a flat saw is electric: shallower and lighter', () => {
    const slab = { face: 'floor', depthIn: 10, indoors: false, enginesAllowed: true } as const;
    expect(verdict('flat_saw', slab).ok).toBe(true);
    expect(verdict('flat_saw', { ...slab, indoors: true }).reasons.join()).toContain('8 in');
    expect(verdict('flat_saw', { ...slab, depthIn: 6, indoors: true, floorLimitPsf: 100 }).ok).toBe(true);
    expect(verdict('flat_saw', { ...slab, depthIn: 6, floorLimitPsf: 100 }).reasons.join()).toContain('psf');
    expect(verdict('flat_saw', { ...slab, depthIn: 6, indoors: true }).cautions.join()).toContain(
      'No engines',
    );
  });

  it('a flat saw needs its doorway', () => {
    expect(verdict('flat_saw', { face: 'floor', depthIn: 6, doorwayIn: 32 }).reasons.join()).toContain(
      'doorway',
    );
    expect(verdict('flat_saw', { face: 'floor', depthIn: 6, doorwayIn: 36 }).ok).toBe(true);
  });

  it('a barrel over 72 in is stitch drilled instead', () => {
    expect(verdict('core_drill', { work: 'core', diameterIn: 80 }).reasons.join()).toContain('stitch');
  });

  it('takes the company’s own reach', () => {
    const companyReach = { wall: [{ diameterIn: 60, reachIn: 27 }] };
    expect(verdict('wall_saw', { depthIn: 26, bothFacesReachable: false, companyReach }).ok).toBe(true);
  });
});
