import { availableParallelism } from 'node:os';
import { Worker } from 'node:worker_threads';
import { encodePhoto, type PhotoTime } from './encode-photo.ts';
import type { DemoPhotoName } from './scenes.ts';

export { demoScenes, type DemoPhotoName } from './scenes.ts';
export type { PhotoTime } from './encode-photo.ts';

/** Drawn larger and brought down, which averages chance and edges. */
const OVERSIZE = 1.15;

/** Ends of the work under way; as many pictures are drawn at once as there are cores. */
const lanes: Promise<unknown>[] = Array.from({ length: availableParallelism() }, () => Promise.resolve());
let turn = 0;

/**
 * A JPEG drawn by code that looks as a phone's picture of the site does, 4 : 3, with the time taken in its EXIF. The
 * same name gives the same picture. About two seconds of one core, off the caller's thread; call several at once.
 */
export function drawPhoto(name: DemoPhotoName, time: PhotoTime, widthPx = 1024): Promise<Buffer> {
  const lane = turn % lanes.length;
  turn += 1;
  const drawn = (lanes[lane] ?? Promise.resolve()).then(() => draw(name, time, widthPx));
  lanes[lane] = drawn.catch(() => undefined);
  return drawn;
}

async function draw(name: DemoPhotoName, time: PhotoTime, widthPx: number): Promise<Buffer> {
  const width = Math.round(widthPx * OVERSIZE);
  const height = Math.round((width * 3) / 4);
  const pixels = await new Promise<Uint8Array>((resolve, reject) => {
    // Compiled name: the rewriting of import paths does not reach a URL.
    const worker = new Worker(new URL('./render.worker.js', import.meta.url), {
      workerData: { name, width, height },
    });
    worker.once('message', resolve);
    worker.once('error', reject);
  });
  return encodePhoto({ pixels, width, height }, { ...time, widthPx });
}
