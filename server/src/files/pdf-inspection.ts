import {
  decodePDFRawStream,
  PDFArray,
  PDFCatalog,
  PDFContext,
  PDFDict,
  PDFName,
  PDFNumber,
  PDFPageLeaf,
  PDFParser,
  PDFRawStream,
  PDFStream,
  type PDFObject,
} from 'pdf-lib';

export type PdfVerdict =
  { ok: true; pages: number } | { ok: false; because: 'damaged' | 'encrypted' | 'active' | 'pages' };

/** Keys and action names that make a PDF more than paper (ISO 32000-1, 7.11.4, 12.6.4, 12.7.8; 32000-2, 13.7). */
const ACTIVE = new Set([
  'JavaScript',
  'JS',
  'Launch',
  'EmbeddedFile',
  'EmbeddedFiles',
  'XFA',
  'RichMedia',
  'SubmitForm',
  'ImportData',
  'GoToE',
]);
/** A stream of objects decodes to this at most; what is larger is made to fill memory. */
const MAX_DECODED_BYTES = 64 * 1024 * 1024;
const MAX_DEPTH = 60;

class Stop extends Error {
  constructor(readonly because: 'damaged' | 'active' | 'pages') {
    super(because);
  }
}

/**
 * Whether a PDF is a plain document of at most `maxPages`. Every object is looked at as it is parsed, so also those in
 * compressed object streams and those that a later revision of the file replaces: readers differ in which they show.
 * Meant for a worker: a hostile file may take the time and memory it is given.
 */
export async function inspectPdf(bytes: Uint8Array, maxPages: number): Promise<PdfVerdict> {
  if (isEncrypted(bytes)) return { ok: false, because: 'encrypted' };
  const parser = PDFParser.forBytesWithOptions(bytes, Infinity, true);
  const { context } = parser as unknown as { context: PDFContext };
  let pageObjects = 0;
  const assign = context.assign.bind(context);
  let stopped: Stop | null = null;
  context.assign = (ref, object) => {
    try {
      if (object instanceof PDFPageLeaf) pageObjects += 1;
      // A file saved many times holds each page many times; far more is made to fill memory.
      if (pageObjects > maxPages * 10) throw new Stop('pages');
      inspectObject(object, 0);
    } catch (error) {
      // The parser turns any error into its own, so the first reason is kept here.
      if (error instanceof Stop) stopped ??= error;
      throw error;
    }
    assign(ref, object);
  };
  try {
    await limitingDecodedBytes(() => parser.parseDocument());
    if (stopped !== null) throw stopped;
    return { ok: true, pages: countPages(context, maxPages) };
  } catch (error) {
    const stop = stopped ?? (error instanceof Stop ? error : null);
    return { ok: false, because: (stop as Stop | null)?.because ?? 'damaged' };
  }
}

/** The trailer names an encryption dictionary; it is never inside what it encrypts. */
function isEncrypted(bytes: Uint8Array): boolean {
  return /\/Encrypt\s+\d+\s+\d+\s+R\b|\/Encrypt\s*<</.test(
    Buffer.from(bytes.buffer, bytes.byteOffset, bytes.length).toString('latin1'),
  );
}

function inspectObject(object: PDFObject, depth: number): void {
  if (depth > MAX_DEPTH) throw new Stop('damaged');
  if (object instanceof PDFName) {
    if (ACTIVE.has(object.decodeText())) throw new Stop('active');
  } else if (object instanceof PDFArray) {
    for (const item of object.asArray()) inspectObject(item, depth + 1);
  } else if (object instanceof PDFDict) {
    inspectDict(object, depth);
  } else if (object instanceof PDFStream) {
    if (object instanceof PDFRawStream) refuseUndeclaredObjectStream(object.dict);
    inspectDict(object.dict, depth);
  }
}

function inspectDict(dict: PDFDict, depth: number): void {
  for (const [key, value] of dict.entries()) {
    inspectObject(key, depth + 1);
    inspectObject(value, depth + 1);
  }
  const file = dict.get(PDFName.of('EF'));
  if (file instanceof PDFDict && (file.has(PDFName.of('F')) || file.has(PDFName.of('UF'))))
    throw new Stop('active');
}

/** The parser opens a stream of objects only when it says so; a reader may open one that does not. */
function refuseUndeclaredObjectStream(dict: PDFDict): void {
  const looksLikeOne = dict.has(PDFName.of('First')) && dict.get(PDFName.of('N')) instanceof PDFNumber;
  if (looksLikeOne && dict.get(PDFName.of('Type')) !== PDFName.of('ObjStm')) throw new Stop('damaged');
}

/** Pages as a reader would show them: one object may stand in the tree many times. */
function countPages(context: PDFContext, maxPages: number): number {
  const catalog = context.lookup(context.trailerInfo.Root);
  if (!(catalog instanceof PDFCatalog)) throw new Stop('damaged');
  let pages = 0;
  let visits = 0;
  catalog.Pages().traverse((node) => {
    visits += 1;
    if (node instanceof PDFPageLeaf) pages += 1;
    if (pages > maxPages || visits > maxPages * 20) throw new Stop('pages');
  });
  if (pages === 0) throw new Stop('damaged');
  return pages;
}

interface GrowingStream {
  ensureBuffer(bytes: number): Uint8Array;
}

/** Object streams grow by `ensureBuffer` of the decoders' common parent; a limit there stops a bomb as it unfolds. */
async function limitingDecodedBytes<T>(work: () => Promise<T>): Promise<T> {
  const parent = decoderPrototype();
  const grow = parent.ensureBuffer;
  parent.ensureBuffer = function limited(this: GrowingStream, bytes: number) {
    if (bytes > MAX_DECODED_BYTES) throw new Stop('damaged');
    return grow.call(this, bytes);
  };
  try {
    return await work();
  } finally {
    parent.ensureBuffer = grow;
  }
}

function decoderPrototype(): GrowingStream {
  const dict = PDFContext.create().obj({ Filter: 'RunLengthDecode' });
  const decoder: unknown = decodePDFRawStream(PDFRawStream.of(dict, new Uint8Array()));
  return Object.getPrototypeOf(Object.getPrototypeOf(decoder)) as GrowingStream;
}
