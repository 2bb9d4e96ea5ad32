import { checkChoice, checkNumber, checkObject } from '../check.ts';
import { cutLimits, type FieldLimit } from '../limits.ts';
import { cutKinds, type Cut, type CutKind, type CutTakeoff } from '../types.ts';
import { takeoffCore, takeoffStitch, takeoffWire } from './cores.ts';
import {
  takeoffBar,
  takeoffBlock,
  takeoffChase,
  takeoffCurb,
  takeoffJoints,
  takeoffLine,
  takeoffLip,
  takeoffPipe,
} from './lines.ts';
import { takeoffOpening } from './opening.ts';
import { takeoffTrench } from './trench.ts';

const fieldLimits = new Map<CutKind, readonly (readonly [field: string, limit: FieldLimit])[]>(
  cutKinds.map((kind) => [kind, Object.entries(cutLimits[kind])]),
);

/**
 * What one line of a cut list comes to. Saw feet count sides, ends, perimeter and cross cuts, times `count`;
 * overcuts are apart in `overcutFt`. Nothing is rounded.
 * @throws CuttingInputError naming the field, `kind` for an unknown kind
 */
export function takeoffCut(cut: Cut): CutTakeoff {
  checkCut(cut);
  switch (cut.kind) {
    case 'line':
      return takeoffLine(cut);
    case 'trench':
      return takeoffTrench(cut);
    case 'opening':
      return takeoffOpening(cut);
    case 'core':
      return takeoffCore(cut);
    case 'stitch':
      return takeoffStitch(cut);
    case 'joints':
      return takeoffJoints(cut);
    case 'wire':
      return takeoffWire(cut);
    case 'curb':
      return takeoffCurb(cut);
    case 'chase':
      return takeoffChase(cut);
    case 'block':
      return takeoffBlock(cut);
    case 'pipe':
      return takeoffPipe(cut);
    case 'bar':
      return takeoffBar(cut);
    case 'lip':
      return takeoffLip(cut);
  }
}

/** Kind and every numeric field; what is a choice or a list the takeoff of the kind checks itself. */
function checkCut(cut: unknown): void {
  const fields = checkObject(cut, 'cut');
  const kind = checkChoice(fields.kind, 'kind', cutKinds);
  for (const [field, limit] of fieldLimits.get(kind) ?? []) {
    const isLeftOut = limit.optional === true && fields[field] === undefined;
    if (!isLeftOut) checkNumber(fields[field], field, limit);
  }
}
