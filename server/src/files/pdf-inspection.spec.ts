import { deflateSync } from 'node:zlib';
import { PDFDocument, PDFName, PDFString } from 'pdf-lib';
import { activeParts, activePdf, plainPdf } from '../../test/pdf-samples.ts';
import { inspectPdf } from './pdf-inspection.ts';

const MAX = 200;
const inspect = (bytes: Uint8Array) => inspectPdf(bytes, MAX);

beforeAll(() => jest.spyOn(console, 'warn').mockImplementation(() => undefined));

describe('inspecting a PDF (D-43)', () => {
  it.each([true, false])('takes a plain drawing (object streams: %s)', async (streams) => {
    expect(await inspect(await plainPdf(3, streams))).toEqual({ ok: true, pages: 3 });
  });

  describe.each(Object.keys(activeParts))('%s', (part) => {
    it.each([true, false])('is refused (in object streams: %s)', async (streams) => {
      const bytes = await activePdf(part, streams);
      if (streams)
        expect(Buffer.from(bytes).toString('latin1')).not.toMatch(/\/(JavaScript|JS|Launch|XFA|RichMedia)\b/);
      expect(await inspect(bytes)).toEqual({ ok: false, because: 'active' });
    });
  });

  it('is not fooled by a name written with escapes', async () => {
    const text = Buffer.from(await activePdf('/Launch', false))
      .toString('latin1')
      .replace('/Launch', '/L#61unch');
    expect(await inspect(Buffer.from(text, 'latin1'))).toEqual({ ok: false, because: 'active' });
  });

  it('looks at objects that a later revision of the file replaces', async () => {
    const first = Buffer.from(await activePdf('/Launch', false));
    const text = first.toString('latin1');
    const number = /(\d+) 0 obj\n<<\n\/S \/Launch/.exec(text)?.[1] ?? /\/Root (\d+) 0 R/.exec(text)?.[1];
    const harmless = Buffer.from(
      `\n${number} 0 obj\n<< /Type /Catalog /Pages 1 0 R >>\nendobj\ntrailer << >>\n%%EOF\n`,
    );
    expect(await inspect(Buffer.concat([first, harmless]))).toEqual({ ok: false, because: 'active' });
  });

  it('refuses encrypted, cut-off and empty documents', async () => {
    const document = await PDFDocument.create();
    document.addPage();
    document.context.trailerInfo.Encrypt = document.context.register(
      document.context.obj({
        Filter: 'Standard',
        V: 1,
        R: 2,
        O: PDFString.of('o'),
        U: PDFString.of('u'),
        P: -4,
      }),
    );
    expect(await inspect(await document.save())).toEqual({ ok: false, because: 'encrypted' });
    const whole = await plainPdf(2);
    expect(await inspect(whole.subarray(0, whole.length / 2))).toEqual({ ok: false, because: 'damaged' });
    expect(await inspect(Buffer.from('%PDF-1.7\n%%EOF'))).toEqual({ ok: false, because: 'damaged' });
  });

  it('counts pages as a reader shows them', async () => {
    expect(await inspect(await plainPdf(MAX))).toEqual({ ok: true, pages: MAX });
    expect(await inspect(await plainPdf(MAX + 1))).toEqual({ ok: false, because: 'pages' });
    // One page object that stands in the tree many times.
    const document = await PDFDocument.create();
    const page = document.addPage();
    const kids = document.catalog.Pages().Kids();
    for (let n = 0; n < MAX; n += 1) kids.push(page.ref);
    document.catalog.Pages().set(PDFName.of('Count'), document.context.obj(1));
    expect(await inspect(await document.save())).toEqual({ ok: false, because: 'pages' });
  });

  it('stops an object stream that unfolds to more than it may (D-42)', async () => {
    const packed = deflateSync(Buffer.alloc(200 * 1024 * 1024, 0x20), { level: 9 });
    const head = `%PDF-1.7\n1 0 obj\n<< /Type /ObjStm /N 1 /First 4 /Filter /FlateDecode /Length ${packed.length} >>\nstream\n`;
    const bytes = Buffer.concat([
      Buffer.from(head, 'latin1'),
      packed,
      Buffer.from('\nendstream\nendobj\n%%EOF'),
    ]);
    const before = process.memoryUsage().arrayBuffers;
    expect(await inspect(bytes)).toEqual({ ok: false, because: 'damaged' });
    expect(process.memoryUsage().arrayBuffers - before).toBeLessThan(250 * 1024 * 1024);
  });

  it('refuses a stream that only a reader, not the parser, would open', async () => {
    const document = await PDFDocument.create();
    document.addPage();
    document.context.register(document.context.stream('1 0 << >>', { N: 1, First: 4 }));
    expect(await inspect(await document.save({ useObjectStreams: false }))).toEqual({
      ok: false,
      because: 'damaged',
    });
  });
});
