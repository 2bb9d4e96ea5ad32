import {
  decodePDFRawStream,
  PDFArray,
  PDFDict,
  PDFDocument,
  PDFName,
  PDFRawStream,
  type PDFPage,
} from 'pdf-lib';

type Glyphs = Map<string, string>;

/**
 * The text a person could select on each page of one of our own PDFs: glyph ids read back through each font's
 * ToUnicode map (ISO 32000-1, 9.10.3), which is what a reader program copies by. Not for PDFs of others.
 */
export async function readPdfText(bytes: Uint8Array): Promise<string[]> {
  const document = await PDFDocument.load(bytes, { updateMetadata: false });
  return document.getPages().map(pageText);
}

function pageText(page: PDFPage): string {
  const fonts = new Map<string, Glyphs>();
  for (const [name, reference] of page.node.Resources()?.lookup(PDFName.of('Font'), PDFDict).entries() ??
    []) {
    const font = page.doc.context.lookup(reference, PDFDict);
    fonts.set(name.toString(), glyphsOf(decoded(font.lookup(PDFName.of('ToUnicode')))));
  }
  let glyphs: Glyphs = new Map();
  let text = '';
  for (const token of contentOf(page).matchAll(/(\/F\d+) [\d.]+ Tf|<([0-9a-f]+)>|(\bET\b)/g)) {
    const [, font, shown, end] = token;
    if (font !== undefined) glyphs = fonts.get(font) ?? new Map();
    else if (shown !== undefined)
      text += [...shown.matchAll(/.{4}/g)].map(([id]) => glyphs.get(id) ?? '\ufffd').join('');
    else if (end !== undefined) text += '\n';
  }
  return text;
}

function contentOf(page: PDFPage): string {
  const contents = page.node.Contents();
  const streams = contents instanceof PDFArray ? contents.asArray() : [contents];
  return streams.map((stream) => decoded(page.doc.context.lookup(stream))).join('\n');
}

function decoded(stream: unknown): string {
  if (!(stream instanceof PDFRawStream)) throw new Error('not a stream');
  return Buffer.from(decodePDFRawStream(stream).decode()).toString('latin1');
}

/** `<first> <last> [<code> …]` of a ToUnicode map; codes are UTF-16. */
function glyphsOf(map: string): Glyphs {
  const glyphs: Glyphs = new Map();
  for (const [, first = '0', list = ''] of map.matchAll(/<([0-9a-f]{4})> <[0-9a-f]{4}> \[([^\]]*)\]/g)) {
    [...list.matchAll(/<([0-9a-f ]+)>/g)].forEach(([, code = ''], index) => {
      const id = (parseInt(first, 16) + index).toString(16).padStart(4, '0');
      const units = code.replaceAll(' ', '').match(/.{4}/g) ?? [];
      glyphs.set(id, String.fromCharCode(...units.map((unit) => parseInt(unit, 16))));
    });
  }
  return glyphs;
}
