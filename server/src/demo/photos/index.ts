import sharp from 'sharp';
import { render } from './render.ts';
import type { Scene } from './scene.ts';
import { coresAfterDrilling, openingAfterSawing, sawnJoints } from './scenes-after-work.ts';
import { accessPath, slabWithLayout, wallWithMarkedOpening, waterAndPower } from './scenes-before-work.ts';
import { trenchMarkedOnPavement, trenchSawn } from './scenes-outdoors.ts';

/** The demo's pictures, by what they show. */
export const demoPhotos = {
  slab_with_layout: slabWithLayout,
  wall_with_marked_opening: wallWithMarkedOpening,
  trench_marked_on_pavement: trenchMarkedOnPavement,
  access_path: accessPath,
  water_and_power: waterAndPower,
  cores_after_drilling: coresAfterDrilling,
  opening_after_sawing: openingAfterSawing,
  trench_sawn: trenchSawn,
  sawn_joints: sawnJoints,
} satisfies Record<string, () => Scene>;
export type DemoPhotoName = keyof typeof demoPhotos;

export interface PhotoOptions {
  /** When the camera says it was taken, at the site: "2026-11-20T09:12:33". */
  takenAt: string;
  /** The site's offset then: "-05:00". */
  offset: string;
  widthPx?: number;
}

/**
 * A JPEG drawn by code that looks as a phone's picture of the site does, 4 : 3, with the time taken in its EXIF.
 * The same name gives the same picture.
 */
export async function drawPhoto(
  name: DemoPhotoName,
  { takenAt, offset, widthPx = 1024 }: PhotoOptions,
): Promise<Buffer> {
  // Drawn larger and brought down, which averages chance and edges.
  const width = Math.round(widthPx * 1.15);
  const height = Math.round((width * 3) / 4);
  const pixels = render(demoPhotos[name](), width, height);
  const time = takenAt.replaceAll('-', ':').replace('T', ' ');
  return sharp(pixels, { raw: { width, height, channels: 3 } })
    .resize(widthPx, Math.round((widthPx * 3) / 4), { kernel: 'lanczos3' })
    .jpeg({ quality: 84 })
    .withExif({
      IFD0: { ImageDescription: name },
      IFD2: { DateTimeOriginal: time, OffsetTimeOriginal: offset },
    })
    .toBuffer();
}
