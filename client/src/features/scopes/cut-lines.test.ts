import { describe, expect, it } from 'vitest';
import { changed } from './components/form/use-cut-list.ts';
import { newCut, nextMark, readCut, type DraftCut } from './cut-lines.ts';

function opening(fields: Record<string, unknown> = {}): DraftCut {
  const line = newCut('opening', []);
  return { ...line, cut: { ...line.cut, lengthFt: 4, widthFt: 8, thicknessIn: 8, ...fields } } as DraftCut;
}

describe('a cut list in the making', () => {
  it('numbers marks by kind and goes on after the highest', () => {
    const first = newCut('core', []);
    expect(first.mark).toBe('C1');
    const lines = [{ ...first, mark: 'C7' }, newCut('trench', [])];
    expect(nextMark('core', lines)).toBe('C8');
    expect(nextMark('line', lines)).toBe('L1');
  });

  it('adds the same kind below, duplicates with an own id and mark, removes', () => {
    const a = opening();
    const b = newCut('core', [a]);
    const added = changed([a, b], { type: 'addBelow', id: a.id });
    expect(added.map((line) => line.cut.kind)).toEqual(['opening', 'opening', 'core']);
    expect(added[1]?.cut.lengthFt).toBeNull();
    const doubled = changed([a, b], { type: 'duplicate', id: a.id });
    expect(doubled[1]).toMatchObject({ mark: 'O2', cut: { lengthFt: 4, widthFt: 8 } });
    expect(doubled[1]?.id).not.toBe(a.id);
    expect(changed(doubled, { type: 'remove', id: a.id })).toHaveLength(2);
  });

  it('leaves every other line the very same object', () => {
    const lines = [opening(), opening()];
    const next = changed(lines, {
      type: 'figure',
      id: lines[1]?.id ?? '',
      field: 'count',
      value: 3,
    });
    expect(next[0]).toBe(lines[0]);
    expect(next[1]).not.toBe(lines[1]);
  });

  it('keeps size and depth when the kind changes, and a mark that was typed by hand', () => {
    const line = opening();
    const [trench] = changed([line], { type: 'kind', id: line.id, kind: 'trench' });
    expect(trench).toMatchObject({ mark: 'T1', cut: { kind: 'trench', lengthFt: 4, thicknessIn: 8 } });
    expect(trench?.cut).not.toHaveProperty('corners');
    const named = { ...line, mark: 'Door A' };
    const [core] = changed([named], { type: 'kind', id: line.id, kind: 'core' });
    expect(core).toMatchObject({ mark: 'Door A', cut: { kind: 'core', depthIn: 8, diameterIn: null } });
  });

  it('takes 500 lines and no more', () => {
    const lines = Array.from({ length: 500 }, () => opening());
    expect(changed(lines, { type: 'add', kind: 'core' })).toHaveLength(500);
    expect(changed(lines, { type: 'duplicate', id: lines[0]?.id ?? '' })).toHaveLength(500);
  });
});

describe('readCut', () => {
  it('takes off a whole line, once', () => {
    // 2 × (4 + 8) ft of perimeter, 8 in deep.
    const line = opening();
    const reading = readCut(line);
    expect(reading).toMatchObject({ state: 'whole', takeoff: { sawFt: 24, inchFeet: 192 } });
    expect(readCut(line)).toBe(reading);
  });

  it('is half while a figure is missing or no number', () => {
    expect(readCut(opening({ lengthFt: null }))).toEqual({ state: 'half' });
    expect(readCut(opening({ lengthFt: '12ft' }))).toEqual({ state: 'half' });
  });

  it('says at the field what the engine does not take', () => {
    const reading = readCut(opening({ bladeDiameterIn: 10 }));
    expect(reading).toMatchObject({ state: 'refused', errors: { bladeDiameterIn: expect.any(String) } });
  });

  it('finds the pieces when they must come out by weight', () => {
    const line = opening();
    const [wanted] = changed([line], { type: 'removal', id: line.id, isWanted: true });
    const [heavy] = changed([wanted as DraftCut], {
      type: 'figure',
      id: line.id,
      field: 'removal.maxPieceLb',
      value: 1000,
    });
    // 4 × 8 ft × 8 in, 150 pcf and a tenth more, 1,000 lb: 12 LF of cross cut.
    expect(readCut(heavy as DraftCut)).toMatchObject({ state: 'whole', takeoff: { crossCutFt: 12 } });
  });
});
