import type { CutListTakeoff, CutQuantities } from '@kerfyard/common/cutting';
import type { CutLine } from '@kerfyard/common/scopes';
import { cutDetails, cutSize, figure, kindWord } from '../cut.words.en.ts';
import { writeSketch } from './paper-sketch.ts';
import type { PaperWriter } from './paper-writer.ts';

/** The cut list with its quantities as the engine takes them off, and the sketch that shows them. */
export function writeCutList(writer: PaperWriter, cuts: readonly CutLine[], takeoff: CutListTakeoff): void {
  writeSketch(writer, cuts);
  writer.table(
    [
      { title: 'Mark', width: 44 },
      { title: 'Cut' },
      { title: 'Count', width: 40, align: 'right' },
      { title: 'Saw ft', width: 50, align: 'right' },
      { title: 'In-ft', width: 56, align: 'right' },
      { title: 'Core-in', width: 52, align: 'right' },
      { title: 'Out, lb', width: 56, align: 'right' },
    ],
    cuts.map((line, index) => [
      { text: line.mark, strong: true },
      cutText(line),
      figure(line.cut.count),
      ...quantityCells(takeoff.cuts[index]),
    ]),
    { total: ['', 'All cuts', '', ...quantityCells(takeoff.totals)] },
  );
  writer.paragraph(
    'Saw ft counts sides, ends, perimeter and cross cuts and leaves overcuts out; in-ft is saw ft × depth; core-in is holes × depth; weight is of the concrete taken out, without lifting allowance. Written sizes govern over drawn ones.',
    { quiet: true },
  );
}

function cutText({ cut, note }: CutLine): string {
  const details = cutDetails(cut);
  return [`${kindWord(cut.kind)} ${cutSize(cut)}`, details, note].filter((part) => part !== '').join('\n');
}

function quantityCells(quantities: CutQuantities | undefined): string[] {
  if (quantities === undefined) return ['', '', '', ''];
  const { sawFt, inchFeet, coreInches, removedLb } = quantities;
  return [shown(sawFt, 1), shown(inchFeet, 1), shown(coreInches, 1), shown(removedLb, 0)];
}

/** Nothing at all is a dash, so that a zero is never read as forgotten. */
function shown(value: number, decimals: 0 | 1): string {
  return value === 0 ? '–' : figure(value, decimals);
}
