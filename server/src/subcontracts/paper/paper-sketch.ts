import { cutSketch, type CircleRole, type CutSketch, type LineRole } from '@kerfyard/common/cutting';
import type { CutLine } from '@kerfyard/common/scopes';
import { colours, contentWidth } from './paper-theme.ts';
import type { PaperWriter } from './paper-writer.ts';

const maxHeight = 190;
const markSize = 6.5;
const barLabelHeight = 10;

const lineStyles: Record<LineRole, { width: number; colour: string; dash?: number }> = {
  cut: { width: 1.1, colour: colours.ink },
  overcut: { width: 0.7, colour: colours.accent },
  cross_cut: { width: 0.7, colour: colours.ink, dash: 2.5 },
  joint: { width: 0.9, colour: colours.ink },
  edge: { width: 0.5, colour: colours.quiet },
};
const circleStyles: Record<CircleRole, { width: number; colour: string }> = {
  core: { width: 1, colour: colours.ink },
  section: { width: 0.7, colour: colours.quiet },
};

/** The cut list drawn to scale, each shape with its mark, and the note that positions are not to scale. */
export function writeSketch(writer: PaperWriter, cuts: readonly CutLine[]): void {
  const sketch = cutSketch(cuts.map((line) => line.cut));
  const scale = Math.min(contentWidth / sketch.box.width, maxHeight / sketch.box.height);
  const height = sketch.box.height * scale + barLabelHeight;
  writer.figure({ height, alt: sketch.text.join(' ') }, (doc, at) => {
    const origin = { x: at.x - sketch.box.x * scale, y: at.y - sketch.box.y * scale };
    drawShapes(doc, sketch, { origin, scale });
    writer.style({ size: markSize, colour: colours.quiet });
    for (const cut of sketch.cuts) {
      const mark = writer.printable(cuts[cut.index]?.mark ?? '');
      const label = cut.count === 1 ? mark : `${mark} ×${cut.count}`;
      const overhang = Math.max(0, doc.widthOfString(label) - cut.box.width * scale) / 2;
      const x = Math.max(at.x, origin.x + cut.box.x * scale - overhang);
      doc.text(label, x, origin.y + (cut.box.y + cut.box.height) * scale + 2, { lineBreak: false });
    }
    const { from } = sketch.bar.line;
    doc.text(sketch.bar.label, origin.x + from.x * scale, origin.y + from.y * scale + 3, {
      lineBreak: false,
    });
  });
  const rest = sketch.omitted === 0 ? '' : ` ${sketch.omitted} more cuts of the list are not drawn.`;
  writer.paragraph(`${sketch.note}${rest}`, { quiet: true });
}

function drawShapes(
  doc: PDFKit.PDFDocument,
  sketch: CutSketch,
  { origin, scale }: { origin: { x: number; y: number }; scale: number },
): void {
  const x = (feet: number): number => origin.x + feet * scale;
  const y = (feet: number): number => origin.y + feet * scale;
  for (const line of [...sketch.cuts.flatMap((cut) => cut.lines), sketch.bar.line]) {
    const style = lineStyles[line.role];
    if (style.dash === undefined) doc.undash();
    else doc.dash(style.dash, { space: style.dash });
    doc
      .lineWidth(style.width)
      .moveTo(x(line.from.x), y(line.from.y))
      .lineTo(x(line.to.x), y(line.to.y))
      .stroke(style.colour);
  }
  doc.undash();
  for (const circle of sketch.cuts.flatMap((cut) => cut.circles)) {
    const style = circleStyles[circle.role];
    doc
      .lineWidth(style.width)
      .circle(x(circle.centre.x), y(circle.centre.y), Math.max(0.8, circle.radiusFt * scale))
      .stroke(style.colour);
  }
}
