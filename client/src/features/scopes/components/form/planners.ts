import type { RawValues } from '../../../calculators/calculator.ts';
import type { DraftCut } from '../../cut-lines.ts';

type CutFields = DraftCut['cut'];

/** How a calculator's fields and a cut's figures are the same thing under two names. */
interface Planner {
  /** Sizes nobody has typed yet: a plan begins without anyone else's numbers. */
  readonly blank: RawValues;
  /** What the calculator starts with for a cut; an empty figure is an empty field. */
  readonly read: (cut: CutFields) => RawValues;
  /** The cut's figures for what the calculator was given, values as `evaluate` read them. */
  readonly write: (values: Readonly<Record<string, unknown>>) => CutFields;
}

export type PlannedKind = 'trench' | 'joints';

/** Cuts that are planned before they are cut. Each has a calculator of its own name. */
export const planners: Readonly<Record<PlannedKind, Planner>> = {
  trench: {
    blank: { lengthFt: '', widthIn: '', slabThicknessIn: '' },
    read: (cut) => ({
      lengthFt: typed(cut.lengthFt),
      widthIn: typeof cut.widthFt === 'number' ? String(rounded(cut.widthFt * 12, 3)) : typed(cut.widthFt),
      slabThicknessIn: typed(cut.thicknessIn),
    }),
    write: ({ lengthFt, widthIn, slabThicknessIn }) => ({
      lengthFt: Number(lengthFt),
      widthFt: rounded(Number(widthIn) / 12, 4),
      thicknessIn: Number(slabThicknessIn),
    }),
  },
  joints: {
    blank: { lengthFt: '', widthFt: '', thicknessIn: '' },
    read: (cut) => ({
      lengthFt: typed(cut.lengthFt),
      widthFt: typed(cut.widthFt),
      thicknessIn: typed(cut.thicknessIn),
      spacingFactor: typed(cut.spacingFactor),
      capFt: typed(cut.capFt),
      maxAspect: typed(cut.maxAspect ?? usualAspect),
      baysAlongLengthFt: listed(cut.baysAlongLengthFt),
      baysAlongWidthFt: listed(cut.baysAlongWidthFt),
    }),
    write: ({ baysAlongLengthFt, baysAlongWidthFt, maxAspect, ...slab }) => ({
      lengthFt: Number(slab.lengthFt),
      widthFt: Number(slab.widthFt),
      thicknessIn: Number(slab.thicknessIn),
      spacingFactor: Number(slab.spacingFactor),
      capFt: Number(slab.capFt),
      maxAspect: maxAspect === usualAspect ? null : Number(maxAspect),
      baysAlongLengthFt: baysOf(baysAlongLengthFt),
      baysAlongWidthFt: baysOf(baysAlongWidthFt),
    }),
  },
};

/** What the engine takes where a cut does not say. */
const usualAspect = 1.5;

export function isPlanned(kind: string): kind is PlannedKind {
  return kind in planners;
}

function typed(value: CutFields[string] | undefined): string {
  return typeof value === 'number' || typeof value === 'string' ? String(value) : '';
}

function listed(value: CutFields[string] | undefined): string {
  return Array.isArray(value) ? value.join(', ') : typed(value);
}

function baysOf(value: unknown): number[] | null {
  return Array.isArray(value) ? value.map(Number) : null;
}

function rounded(value: number, digits: number): number {
  const scale = 10 ** digits;
  return Math.round(value * scale) / scale;
}
