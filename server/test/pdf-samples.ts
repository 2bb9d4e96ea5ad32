import { PDFDocument, PDFHexString, PDFName, PDFString } from 'pdf-lib';

/** A drawing as an office makes it; a plain view as its open action is normal and stays. */
export async function plainPdf(pages = 1, useObjectStreams = true): Promise<Buffer> {
  const document = await PDFDocument.create();
  for (let n = 0; n < pages; n += 1) document.addPage([400, 300]).drawText(`Sheet ${n + 1}`);
  const view = document.context.obj([document.getPage(0).ref, 'Fit']);
  document.catalog.set(PDFName.of('OpenAction'), view);
  return Buffer.from(await document.save({ useObjectStreams }));
}

const javaScript = { Type: 'Action', S: 'JavaScript', JS: PDFString.of('app.alert(1)') };

/** What makes a PDF more than paper, each put into a document by its own key. */
export const activeParts: Record<string, (document: PDFDocument) => void | Promise<void>> = {
  '/OpenAction with /JavaScript': (document) =>
    document.catalog.set(PDFName.of('OpenAction'), document.context.obj(javaScript)),
  '/JS in a page action': (document) =>
    document
      .getPage(0)
      .node.set(PDFName.of('AA'), document.context.obj({ O: { JS: PDFHexString.fromText('x') } })),
  '/Names with /JavaScript': (document) =>
    document.catalog.set(PDFName.of('Names'), document.context.obj({ JavaScript: { Names: [] } })),
  '/Launch': (document) =>
    document.catalog.set(
      PDFName.of('OpenAction'),
      document.context.obj({ S: 'Launch', F: PDFString.of('calc') }),
    ),
  '/EmbeddedFile': (document) =>
    document.attach(Buffer.from('hello'), 'hello.txt', { mimeType: 'text/plain' }),
  '/XFA': (document) =>
    document.catalog.set(PDFName.of('AcroForm'), document.context.obj({ XFA: PDFString.of('<xdp/>') })),
  '/RichMedia': (document) =>
    document.getPage(0).node.set(PDFName.of('Annots'), document.context.obj([{ Subtype: 'RichMedia' }])),
};

export async function activePdf(part: string, useObjectStreams: boolean): Promise<Buffer> {
  const document = await PDFDocument.create();
  document.addPage([400, 300]);
  await activeParts[part]?.(document);
  return Buffer.from(await document.save({ useObjectStreams }));
}
