import { fonts, ink, label, SHEET, stroke, type Pdf, type SheetData } from './sheet.ts';

const right = SHEET.width - SHEET.margin;
const left = right - SHEET.titleWidth;
const top = SHEET.margin;
const bottom = SHEET.height - SHEET.margin;

/** The border and the column at its right: notes, project, firm, sheet number. */
export function drawTitleBlock(doc: Pdf, data: SheetData): void {
  doc.save().lineWidth(1.6).strokeColor(ink.line);
  doc.rect(SHEET.margin, top, SHEET.width - SHEET.margin * 2, SHEET.height - SHEET.margin * 2).stroke();
  doc.restore();
  stroke(
    doc,
    [
      [left, top],
      [left, bottom],
    ],
    { width: 1.6 },
  );
  notes(doc, data);
  stamp(doc);
  firm(doc, data);
  project(doc, data);
  sheetNumber(doc, data);
}

function rule(doc: Pdf, y: number): void {
  stroke(
    doc,
    [
      [left, y],
      [right, y],
    ],
    { width: 0.9 },
  );
}

function paragraph(doc: Pdf, text: string, y: number, size: number, bold = false): number {
  doc
    .font(bold ? fonts.bold : fonts.regular)
    .fontSize(size)
    .fillColor(ink.line);
  const options = { width: SHEET.titleWidth - 24, lineGap: 1 };
  doc.text(text, left + 12, y, options);
  return y + doc.heightOfString(text, options);
}

function notes(doc: Pdf, data: SheetData): void {
  label(doc, 'GENERAL NOTES', [left + 12, top + 18], { size: 9, bold: true });
  let y = top + 32;
  data.notes.forEach((note, index) => {
    label(doc, `${index + 1}.`, [left + 12, y + 5], { size: 7.5 });
    doc.font(fonts.regular).fontSize(7.5).fillColor(ink.line);
    const options = { width: SHEET.titleWidth - 40, lineGap: 0.8 };
    doc.text(note, left + 26, y, options);
    y += doc.heightOfString(note, options) + 4;
  });
}

function stamp(doc: Pdf): void {
  const y = bottom - 330;
  doc.save().lineWidth(0.8).dash(3, { space: 2 }).strokeColor(ink.faint);
  doc
    .rect(left + 12, y, SHEET.titleWidth - 24, 44)
    .stroke()
    .restore();
  const middle = (left + right) / 2;
  label(doc, 'FOR BIDDING', [middle, y + 15], { size: 10, bold: true, color: ink.soft, align: 'center' });
  label(doc, 'Verify all dimensions at the site', [middle, y + 30], {
    size: 7,
    color: ink.soft,
    align: 'center',
  });
}

function firm(doc: Pdf, data: SheetData): void {
  const y = bottom - 274;
  rule(doc, y);
  // The firm's own mark: a set square, drawn here.
  doc.save().lineWidth(1.4).strokeColor(ink.line);
  doc.polygon([left + 14, y + 44], [left + 14, y + 14], [left + 44, y + 44]).stroke();
  doc
    .polygon([left + 20, y + 38], [left + 20, y + 28], [left + 30, y + 38])
    .stroke()
    .restore();
  doc.font(fonts.bold).fontSize(12).fillColor(ink.line);
  doc.text(data.firm, left + 54, y + 13, { width: SHEET.titleWidth - 64, lineGap: -1 });
  paragraph(doc, data.firmLine, y + 54, 7.5);
}

function project(doc: Pdf, data: SheetData): void {
  const y = bottom - 196;
  rule(doc, y);
  label(doc, 'PROJECT', [left + 12, y + 11], { size: 6.5, color: ink.soft });
  const next = paragraph(doc, data.project, y + 18, 11, true);
  paragraph(doc, data.address, next + 2, 8);
}

function sheetNumber(doc: Pdf, data: SheetData): void {
  const y = bottom - 118;
  rule(doc, y);
  label(doc, 'SHEET TITLE', [left + 12, y + 11], { size: 6.5, color: ink.soft });
  paragraph(doc, data.title, y + 18, 10, true);
  rule(doc, bottom - 62);
  const column = left + 92;
  stroke(
    doc,
    [
      [column, bottom - 62],
      [column, bottom],
    ],
    { width: 0.9 },
  );
  const facts: [string, string][] = [
    ['Date', data.date],
    ['Revision', data.revision],
    ['Drawn', data.drawnBy],
    ['Checked', data.checkedBy],
  ];
  facts.forEach(([name, value], index) => {
    const line = bottom - 52 + index * 13.5;
    label(doc, name, [left + 8, line], { size: 6.5, color: ink.soft });
    label(doc, value, [column - 6, line], { size: 7.5, align: 'right' });
  });
  label(doc, data.number, [(column + right) / 2, bottom - 30], { size: 30, bold: true, align: 'center' });
}
