import type { Cut, CutTakeoff, JointsCut, OpeningCut } from '../types.ts';

const plain = new Intl.NumberFormat('en-US', { maximumFractionDigits: 3 });

/** A number for a sentence: at most three decimals, thousands grouped. */
export function inWords(value: number): string {
  return plain.format(value);
}

/** One cut in words: what, how large, how many. The text equivalent of its shape. */
export function describeCut(cut: Cut): string {
  return cut.count === 1 ? nameCut(cut) : `${nameCut(cut)}, ${inWords(cut.count)} of them`;
}

/** What a cut comes to, in the trade's units, the parts that are not zero. */
export function describeTakeoff(takeoff: CutTakeoff): string {
  const parts: readonly (readonly [value: number, unit: string])[] = [
    [takeoff.sawFt, 'ft sawn'],
    [takeoff.inchFeet, 'in-ft'],
    [takeoff.overcutFt, 'ft overcut'],
    [takeoff.crossCutFt, 'ft of it cross cuts'],
    [takeoff.coreHoles, takeoff.coreHoles === 1 ? 'core' : 'cores'],
    [takeoff.coreInches, 'core-in'],
    [takeoff.pieceCuts, 'cut by the piece'],
  ];
  return parts
    .filter(([value]) => value > 0)
    .map(([value, unit]) => `${inWords(value)} ${unit}`)
    .join(', ');
}

function nameCut(cut: Cut): string {
  switch (cut.kind) {
    case 'line':
      return `Line ${inWords(cut.lengthFt)} ft, ${inWords(cut.depthIn)} in deep`;
    case 'trench':
      return `Trench ${size(cut)} ft, ${inWords(cut.thicknessIn)} in thick`;
    case 'opening':
      return `Opening ${size(cut)} ft, ${inWords(cut.thicknessIn)} in thick, ${cornersInWords(cut)}`;
    case 'core':
      return `Core ${inWords(cut.diameterIn)} in, ${inWords(cut.depthIn)} in deep`;
    case 'stitch':
      return `Stitched ${cut.closed ? 'loop' : 'line'} ${inWords(cut.lengthIn)} in, ${inWords(cut.bitDiameterIn)}-in bit, ${inWords(cut.depthIn)} in deep`;
    case 'joints':
      return `Joints in a slab ${size(cut)} ft, ${inWords(cut.thicknessIn)} in thick${baysInWords(cut)}`;
    case 'wire':
      return `Wire cut ${inWords(cut.areaSqFt)} sq ft with ${inWords(cut.pilotCores)} pilot cores`;
    case 'curb':
      return `Curb ${inWords(cut.lengthFt)} ft, ${inWords(cut.heightIn)} in high`;
    case 'chase':
      return `Chase ${inWords(cut.lengthFt)} ft, ${inWords(cut.widthIn)} × ${inWords(cut.depthIn)} in`;
    case 'block':
      return `Block cut ${inWords(cut.cutLengthIn)} in, ${inWords(cut.depthIn)} in deep`;
    case 'pipe':
      return `Pipe ${inWords(cut.outsideDiameterIn)} in outside diameter`;
    case 'bar':
      return `Bar ${inWords(cut.diameterIn)} in`;
    case 'lip':
      return `Lip ${inWords(cut.widthFt)} ft wide, ${inWords(cut.heightIn)} in high`;
  }
}

function size(cut: { readonly lengthFt: number; readonly widthFt: number }): string {
  return `${inWords(cut.lengthFt)} × ${inWords(cut.widthFt)}`;
}

function cornersInWords(cut: OpeningCut): string {
  const words = { overcut: 'corners overcut', cored: 'corners cored', square: 'corners finished square' };
  const uncut = cut.uncutSides ?? [];
  return uncut.length === 0 ? words[cut.corners] : `${words[cut.corners]}, not cut: ${uncut.join(', ')}`;
}

function baysInWords({ baysAlongLengthFt, baysAlongWidthFt }: JointsCut): string {
  const sides = [
    ['length', baysAlongLengthFt],
    ['width', baysAlongWidthFt],
  ] as const;
  return sides
    .flatMap(([side, baysFt]) =>
      baysFt === undefined ? [] : [`, column bays along the ${side} ${baysFt.map(inWords).join(', ')} ft`],
    )
    .join('');
}
