import sharp from 'sharp';

export interface PhotoTime {
  /** When the camera says it was taken, at the site: "2026-11-20T09:12:33". */
  takenAt: string;
  /** The site's offset then: "-05:00". */
  offset: string;
}

interface Pixels {
  /** RGB, row by row. */
  pixels: Uint8Array;
  width: number;
  height: number;
}

/** Rendered pixels as a JPEG of `widthPx`, with the time as a phone writes it (EXIF 2.32). */
export function encodePhoto(
  { pixels, width, height }: Pixels,
  { takenAt, offset, widthPx }: PhotoTime & { widthPx: number },
): Promise<Buffer> {
  const time = takenAt.replaceAll('-', ':').replace('T', ' ');
  return sharp(pixels, { raw: { width, height, channels: 3 } })
    .resize(widthPx, Math.round((widthPx * 3) / 4), { kernel: 'lanczos3' })
    .jpeg({ quality: 84 })
    .withExif({ IFD2: { DateTimeOriginal: time, OffsetTimeOriginal: offset } })
    .toBuffer();
}
