import { openingSides, type CutTakeoff, type OpeningSide } from '@kerfyard/common/cutting';
import {
  cutKinds,
  cutSchema,
  readCutList,
  withoutBlanks,
  type CutLine,
  type ScopeDraft,
} from '@kerfyard/common/scopes';
import { newId } from '../../lib/ids.ts';

/** A line of the cut list as typed: numbers may be missing or half typed. */
export type DraftCut = ScopeDraft['cuts'][number];
export type DraftKind = CutLine['cut']['kind'];
type CutFields = DraftCut['cut'];

export interface NumberFieldOfCut {
  name: string;
  unit: string;
}

const depth = { name: 'depthIn', unit: 'in' };
const thickness = { name: 'thicknessIn', unit: 'in' };
const length = { name: 'lengthFt', unit: 'ft' };
const width = { name: 'widthFt', unit: 'ft' };
const height = { name: 'heightIn', unit: 'in' };
const diameter = { name: 'diameterIn', unit: 'in' };

/** The figures of each kind in the order they are said aloud; the count stands last in every line. */
export const fieldsOfKind: Record<DraftKind, readonly NumberFieldOfCut[]> = {
  line: [length, depth],
  trench: [length, width, thickness],
  opening: [length, width, thickness],
  core: [diameter, depth],
  stitch: [
    { name: 'lengthIn', unit: 'in' },
    { name: 'bitDiameterIn', unit: 'in' },
    { name: 'overlapIn', unit: 'in' },
    depth,
  ],
  joints: [length, width, thickness, { name: 'spacingFactor', unit: '×' }, { name: 'capFt', unit: 'ft' }],
  wire: [
    { name: 'areaSqFt', unit: 'sq ft' },
    { name: 'pilotCores', unit: '' },
    { name: 'pilotDiameterIn', unit: 'in' },
    depth,
  ],
  curb: [length, height],
  chase: [length, { name: 'widthIn', unit: 'in' }, depth],
  block: [{ name: 'cutLengthIn', unit: 'in' }, depth],
  pipe: [{ name: 'outsideDiameterIn', unit: 'in' }],
  bar: [diameter],
  lip: [width, height, { name: 'runPerRise', unit: 'to 1' }],
};

/** Sides of an opening that are left uncut, as typed so far. */
export function uncutSidesOf({ cut }: DraftCut): OpeningSide[] {
  const typed: readonly unknown[] = Array.isArray(cut.uncutSides) ? cut.uncutSides : [];
  return openingSides.filter((side) => typed.includes(side));
}

/** What a new cut of a kind begins with, beside a count of one. */
const startOfKind: Partial<Record<DraftKind, CutFields>> = {
  trench: { sideCuts: 2, endCuts: 2 },
  opening: { corners: 'overcut' },
  stitch: { closed: false },
  joints: { spacingFactor: 30, capFt: 15 },
  wire: { pilotCores: 2, pilotDiameterIn: 2 },
  lip: { runPerRise: 12 },
};

const letterOfKind: Record<DraftKind, string> = {
  line: 'L',
  trench: 'T',
  opening: 'O',
  core: 'C',
  stitch: 'S',
  joints: 'J',
  wire: 'W',
  curb: 'K',
  chase: 'G',
  block: 'B',
  pipe: 'P',
  bar: 'R',
  lip: 'E',
};

const detailFields: ReadonlySet<string> = new Set([
  'sideCuts',
  'endCuts',
  'uncutSides',
  'corners',
  'bladeDiameterIn',
  'passThroughIn',
  'closed',
  'maxAspect',
]);

/** Fields that stand in a line's details, which open by themselves when one of them needs another look. */
export function isDetailField(field: string): boolean {
  return (
    field === 'note' || detailFields.has(field) || field.startsWith('removal') || field.startsWith('bays')
  );
}

export function kindOf(line: DraftCut): DraftKind {
  return cutKinds.find((kind) => kind === line.cut.kind) ?? 'line';
}

function blankCut(kind: DraftKind): CutFields {
  const figures = Object.fromEntries(fieldsOfKind[kind].map((field) => [field.name, null]));
  return { kind, ...figures, ...startOfKind[kind], count: 1 };
}

/** The next free mark of a kind: L1, T1, O1, C1 and on. */
export function nextMark(kind: DraftKind, lines: readonly DraftCut[]): string {
  const letter = letterOfKind[kind];
  const used = lines.flatMap(({ mark }) => {
    const match = new RegExp(`^${letter}(\\d{1,6})$`, 'i').exec(mark.trim());
    return match === null ? [] : [Number(match[1])];
  });
  return `${letter}${Math.max(0, ...used) + 1}`;
}

export function newCut(kind: DraftKind, lines: readonly DraftCut[]): DraftCut {
  return { id: newId(), mark: nextMark(kind, lines), note: '', cut: blankCut(kind) };
}

/** The same cut again under its own mark and id. */
export function duplicateCut(line: DraftCut, lines: readonly DraftCut[]): DraftCut {
  return { ...line, id: newId(), mark: nextMark(kindOf(line), lines) };
}

/** Another kind in the same line: what both kinds have is kept, and so is how deep it goes. */
export function withKind(line: DraftCut, kind: DraftKind, lines: readonly DraftCut[]): DraftCut {
  const isOwnMark = new RegExp(`^${letterOfKind[kindOf(line)]}\\d+$`, 'i').test(line.mark);
  const blank = blankCut(kind);
  const deep = line.cut.thicknessIn ?? line.cut.depthIn ?? null;
  const kept = Object.entries(line.cut).filter(([name]) => name in blank && name !== 'kind');
  const depthName = ['depthIn', 'thicknessIn'].find((name) => name in blank);
  return {
    ...line,
    mark: isOwnMark ? nextMark(kind, lines) : line.mark,
    cut: {
      ...blank,
      ...Object.fromEntries(kept),
      ...(depthName === undefined ? {} : { [depthName]: deep }),
    },
  };
}

/** What the engine makes of a line: its quantities, or its complaints by field, or nothing yet while it is half typed. */
export type CutReading =
  | { state: 'whole'; line: CutLine; takeoff: CutTakeoff }
  | { state: 'refused'; errors: Record<string, string> }
  | { state: 'half' };

// A line is replaced when it changes, never altered, so what was read of it stays true.
const readings = new WeakMap<DraftCut, CutReading>();

export function readCut(line: DraftCut): CutReading {
  const known = readings.get(line);
  if (known !== undefined) return known;
  const fresh = readFresh(line);
  readings.set(line, fresh);
  return fresh;
}

function readFresh(draft: DraftCut): CutReading {
  const parsed = cutSchema.safeParse(withoutBlanks(draft.cut));
  if (!parsed.success) return { state: 'half' };
  const line: CutLine = { id: draft.id, mark: draft.mark, note: draft.note, cut: parsed.data };
  const reading = readCutList([line]);
  if (!reading.ok) {
    return {
      state: 'refused',
      errors: Object.fromEntries(
        reading.issues.map(({ path, message }) => [fieldOfPath(path.replace('cuts.0.cut.', '')), message]),
      ),
    };
  }
  const takeoff = reading.byCutId.get(line.id);
  return takeoff === undefined ? { state: 'half' } : { state: 'whole', line, takeoff };
}

/** Bays are typed in one field: a complaint about one of them is shown there. */
export function fieldOfPath(path: string): string {
  return path.replace(/(bays\w+)\.\d+$/, '$1');
}
