import PDFDocument from 'pdfkit';
import { createRequire } from 'node:module';
import { fonts, ink, SHEET, type Pdf, type SheetData } from './sheet.ts';
import { drawTitleBlock } from './title-block.ts';

const require = createRequire(import.meta.url);
const fontFile = (weight: 400 | 600) =>
  require.resolve(`@fontsource/work-sans/files/work-sans-latin-${weight}-normal.woff`);

/**
 * One sheet with its border and title block; `draw` fills the drawing area.
 * @returns the PDF's bytes; its text is text, so it can be searched and selected
 */
export async function drawSheet(data: SheetData, draw: (doc: Pdf) => void): Promise<Buffer> {
  const doc = new PDFDocument({
    size: [SHEET.width, SHEET.height],
    margin: 0,
    lang: 'en',
    displayTitle: true,
    info: {
      Title: `${data.number} ${data.title}`,
      Author: data.firm,
      Subject: data.project,
      CreationDate: new Date(`${data.date}T12:00:00Z`),
    },
  });
  const chunks: Buffer[] = [];
  doc.on('data', (chunk: Buffer) => chunks.push(chunk));
  const ended = new Promise<void>((resolve, reject) => {
    doc.once('end', resolve);
    doc.once('error', reject);
  });
  doc.registerFont(fonts.regular, fontFile(400));
  doc.registerFont(fonts.bold, fontFile(600));
  doc.rect(0, 0, SHEET.width, SHEET.height).fill(ink.paper);
  draw(doc);
  drawTitleBlock(doc, data);
  doc.end();
  await ended;
  return Buffer.concat(chunks);
}
