import sharp, { type Metadata, type Sharp } from 'sharp';
import { fileLimits, type AcceptedFileType } from '@kerfyard/common/files';
import { refusalWords } from './files.words.en.ts';
import { photoTime } from './photo-time.ts';
import { Refusal } from './refusal.ts';

export type ImageType = Exclude<AcceptedFileType, 'application/pdf'>;

export interface PreparedImage {
  bytes: Buffer;
  /** WebP, at most 480 px a side. */
  thumbnail: Buffer;
  width: number;
  height: number;
  takenAt: Date | null;
}

const MAX_PIXELS = fileLimits.maxMegapixels * 1_000_000;
const THUMBNAIL_PX = 480;
const SECONDS = 20;

// libvips keeps decoded tiles of earlier pictures; uploads never see the same one twice.
sharp.cache(false);

const encoders: Record<ImageType, (image: Sharp) => Sharp> = {
  'image/jpeg': (image) => image.jpeg({ quality: 86 }),
  'image/png': (image) => image.png({ compressionLevel: 8 }),
  'image/webp': (image) => image.webp({ quality: 86 }),
};

/**
 * Draw a picture again from its pixels: what is kept holds no EXIF, XMP, position or anything appended to the file, and
 * stands upright. The caller has already checked that the bytes are of `type`; nothing else reaches a decoder.
 * @throws Refusal for more than 50 megapixels, damaged and cut-off pictures
 */
export async function prepareImage(original: Buffer, type: ImageType): Promise<PreparedImage> {
  const metadata = await readMetadata(original);
  if (`image/${metadata.format}` !== type) throw new Refusal('wrong_type', refusalWords.notAccepted);
  if (metadata.width * metadata.height > MAX_PIXELS) throw new Refusal('too_large', refusalWords.pixels);
  try {
    const upright = open(original).rotate().timeout({ seconds: SECONDS });
    const { data, info } = await encoders[type](upright).toBuffer({ resolveWithObject: true });
    const thumbnail = await open(data)
      .resize(THUMBNAIL_PX, THUMBNAIL_PX, { fit: 'inside', withoutEnlargement: true })
      .webp({ quality: 78 })
      .timeout({ seconds: SECONDS })
      .toBuffer();
    return {
      bytes: data,
      thumbnail,
      width: info.width,
      height: info.height,
      takenAt: photoTime(metadata.exif),
    };
  } catch {
    throw new Refusal('unreadable', refusalWords.picture);
  }
}

/** `failOn: 'warning'` is sharp's strictest: a cut-off JPEG would otherwise come out half grey. One frame only. */
function open(bytes: Buffer): Sharp {
  return sharp(bytes, { limitInputPixels: MAX_PIXELS, failOn: 'warning', pages: 1 });
}

async function readMetadata(original: Buffer): Promise<Metadata> {
  try {
    // The header alone, without the pixel limit: so that a bomb is told apart from a damaged file.
    return await sharp(original, { limitInputPixels: false, pages: 1 }).metadata();
  } catch {
    throw new Refusal('unreadable', refusalWords.picture);
  }
}
