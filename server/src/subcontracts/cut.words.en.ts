import type { CutData, CutKind, CutLine } from '@kerfyard/common/scopes';

const kindWords: Record<CutKind, string> = {
  line: 'Saw line',
  trench: 'Trench',
  opening: 'Opening',
  core: 'Core',
};

/** A number as people write it: at most two decimals, no trailing zeros, thousands apart. */
export function figure(value: number, decimals: 0 | 1 | 2 = 2): string {
  return figures[decimals].format(value);
}

const withDecimals = (decimals: number) =>
  new Intl.NumberFormat('en-US', { maximumFractionDigits: decimals });
const figures = [withDecimals(0), withDecimals(1), withDecimals(2)] as const;

export function kindWord(kind: CutKind): string {
  return kindWords[kind];
}

/** Sizes of one cut, without its count: "40 × 2 ft, 6 in thick". */
export function cutSize(cut: CutData): string {
  switch (cut.kind) {
    case 'line':
      return `${figure(cut.lengthFt)} ft, ${figure(cut.depthIn)} in deep`;
    case 'core':
      return `${figure(cut.diameterIn)} in dia., ${figure(cut.depthIn)} in deep`;
    case 'trench':
    case 'opening':
      return `${figure(cut.lengthFt)} × ${figure(cut.widthFt)} ft, ${figure(cut.thicknessIn)} in thick`;
  }
}

/** What else decides the work of a cut: sides left uncut, corners, pieces. Empty when nothing does. */
export function cutDetails(cut: CutData): string {
  if (cut.kind === 'line' || cut.kind === 'core') return '';
  const details: string[] = [];
  if (cut.kind === 'trench') {
    details.push(cut.sideCuts === 2 ? 'both sides cut' : 'one side cut');
    details.push(`${cut.endCuts === 0 ? 'no' : cut.endCuts} end cut${cut.endCuts === 1 ? '' : 's'}`);
  } else {
    details.push(
      cut.corners === 'overcut'
        ? 'corners overcut'
        : cut.corners === 'cored'
          ? 'corners cored'
          : 'square corners, no overcuts',
    );
    if (cut.uncutSides !== undefined && cut.uncutSides.length > 0) {
      details.push(`not cut: ${cut.uncutSides.join(', ')}`);
    }
  }
  if (cut.removal !== undefined) details.push(`pieces to ${figure(cut.removal.maxPieceLb)} lb`);
  return details.join('; ');
}

/** One line of the cut list in words, as a schedule of values and a mail say it. */
export function cutWords(line: CutLine): string {
  const count = line.cut.count === 1 ? '' : `${figure(line.cut.count)} × `;
  return `${line.mark}: ${count}${kindWord(line.cut.kind).toLowerCase()} ${cutSize(line.cut)}`;
}
