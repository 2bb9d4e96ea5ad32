import { fileLimits } from '@kerfyard/common/files';

const QUALITY = 0.9;

/**
 * A photo over the limit of megapixels is drawn smaller before it is sent; every other file goes as it is.
 * What a browser cannot read goes as it is too: the server says why it does not take it.
 */
export async function shrinkPhoto(file: File): Promise<File> {
  if (!file.type.startsWith('image/') || typeof createImageBitmap !== 'function') return file;
  const picture = await createImageBitmap(file).catch(() => null);
  if (picture === null) return file;
  try {
    const scale = scaleFor(picture.width, picture.height);
    return scale === 1 ? file : await drawSmaller(file, picture, scale);
  } finally {
    picture.close();
  }
}

/** How much smaller both sides become; 1 when the picture fits. */
export function scaleFor(width: number, height: number): number {
  const limit = fileLimits.maxMegapixels * 1_000_000;
  return width * height <= limit ? 1 : Math.sqrt(limit / (width * height));
}

async function drawSmaller(file: File, picture: ImageBitmap, scale: number): Promise<File> {
  const canvas = document.createElement('canvas');
  canvas.width = Math.floor(picture.width * scale);
  canvas.height = Math.floor(picture.height * scale);
  const context = canvas.getContext('2d');
  if (context === null) return file;
  context.drawImage(picture, 0, 0, canvas.width, canvas.height);
  const blob = await new Promise<Blob | null>((done) => canvas.toBlob(done, 'image/jpeg', QUALITY));
  if (blob === null) return file;
  const name = file.name.replace(/\.[^.]*$/, '') + '.jpg';
  return new File([blob], name, { type: 'image/jpeg', lastModified: file.lastModified });
}
