import { createHash } from 'node:crypto';
import { fileTypeFromBuffer } from 'file-type';
import { acceptedFileTypes, type AcceptedFileType, type FileKind } from '@kerfyard/common/files';
import { extensionOf } from './file-name.ts';
import { refusalWords } from './files.words.en.ts';
import { prepareImage } from './prepare-image.ts';
import { preparePdf } from './prepare-pdf.ts';
import { Refusal } from './refusal.ts';

export interface Incoming {
  kind: FileKind;
  /** As cleaned by `cleanFileName`. */
  name: string;
  /** What the sender says it is. */
  declaredType: string;
  bytes: Buffer;
}

/** What is kept of a file: the bytes to store and what is known about them. */
export interface PreparedFile {
  type: AcceptedFileType;
  bytes: Buffer;
  /** SHA-256 of what was sent, before a picture was drawn again. */
  originalSha256: string;
  thumbnail: Buffer | null;
  width: number | null;
  height: number | null;
  pages: number | null;
  takenAt: Date | null;
}

/**
 * Decide by content what a file is, hold name and declared type against it, and make what is kept of it. The allow-list
 * comes before any decoder: SVG, HTML, GIF, archives and office files never reach one.
 * @throws Refusal
 */
export async function prepareFile(incoming: Incoming): Promise<PreparedFile> {
  const { bytes } = incoming;
  if (bytes.length === 0) throw new Refusal('unreadable', refusalWords.empty);
  const type = await detectType(incoming);
  const originalSha256 = createHash('sha256').update(bytes).digest('hex');
  if (type === 'application/pdf') {
    const { pages } = await preparePdf(bytes);
    return { type, bytes, originalSha256, thumbnail: null, width: null, height: null, pages, takenAt: null };
  }
  const image = await prepareImage(bytes, type);
  return { type, ...image, originalSha256, pages: null };
}

async function detectType({ bytes, kind, name, declaredType }: Incoming): Promise<AcceptedFileType> {
  const detected = await fileTypeFromBuffer(bytes).catch(() => undefined);
  const type = detected?.mime ?? '';
  if (!isAccepted(type)) throw new Refusal('wrong_type', refusalWords.notAccepted);
  const extensions: readonly string[] = acceptedFileTypes[type];
  if (declaredType !== type || !extensions.includes(extensionOf(name))) {
    throw new Refusal('wrong_type', refusalWords.extension);
  }
  if (kind === 'photo' && type === 'application/pdf') {
    throw new Refusal('wrong_type', refusalWords.photoOnly);
  }
  return type;
}

const isAccepted = (type: string): type is AcceptedFileType => Object.hasOwn(acceptedFileTypes, type);
