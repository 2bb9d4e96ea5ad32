import { smoothStep } from './noise.ts';
import type { Rgb, Sample, Scene, Surface, Vector } from './scene.ts';

/** How far near things darken a place, in feet. */
const CONTACT_FT = 1.2;

interface Prepared extends Scene {
  casting: readonly Surface[];
}

interface Meeting {
  surface: Surface | null;
  t: number;
}

/**
 * A picture of a scene by one ray a pixel, one towards the lamp and one around for contact shadows, each a little off by
 * chance as grain is.
 * @returns RGB bytes, row by row
 */
export function render(scene: Scene, width: number, height: number): Buffer {
  const prepared = { ...scene, casting: scene.surfaces.filter((surface) => surface.castsShadow) };
  const pixels = Buffer.alloc(width * height * 3);
  const ray = rays(scene, width, height);
  const chance = generator(20_261);
  const sample: Sample = { r: 0, g: 0, b: 0, nx: 0, ny: 0, nz: 0, gloss: 0, glow: 0 };
  for (let row = 0, offset = 0; row < height; row += 1) {
    for (let column = 0; column < width; column += 1, offset += 3) {
      const [dx, dy, dz] = ray(column + chance(), row + chance());
      const color = trace(prepared, [dx, dy, dz], sample, chance);
      for (let channel = 0; channel < 3; channel += 1) pixels[offset + channel] = toByte(color[channel] ?? 0);
    }
  }
  return pixels;
}

function trace(scene: Prepared, direction: Vector, sample: Sample, chance: () => number): Rgb {
  const { at } = scene.camera;
  const { surface, t } = nearest(scene.surfaces, at, direction, Infinity);
  if (surface === null) return scene.sky(direction[1]);
  const place: Vector = [at[0] + direction[0] * t, at[1] + direction[1] * t, at[2] + direction[2] * t];
  sample.gloss = 0;
  sample.glow = 0;
  surface.shade(sample, place[0], place[1], place[2], t);
  const { r, g, b, glow } = sample;
  if (glow > 0) return [r * glow, g * glow, b * glow];
  const lit = lamp(scene, place, direction, sample, chance);
  const open = contact(scene, place, sample, chance);
  const { color } = scene.light;
  const sheen = lit.sheen * sample.gloss;
  const up = 0.8 + 0.2 * sample.ny;
  return [
    r * (scene.ambient[0] * open * up + color[0] * lit.level) + color[0] * sheen,
    g * (scene.ambient[1] * open * up + color[1] * lit.level) + color[1] * sheen,
    b * (scene.ambient[2] * open * up + color[2] * lit.level) + color[2] * sheen,
  ];
}

function nearest(
  surfaces: readonly Surface[],
  [ox, oy, oz]: Vector,
  [dx, dy, dz]: Vector,
  limit: number,
): Meeting {
  let met: Meeting = { surface: null, t: limit };
  for (const surface of surfaces) {
    const t = surface.hit(ox, oy, oz, dx, dy, dz);
    if (t < met.t) met = { surface, t };
  }
  return met;
}

/** Light that arrives straight from the lamp, and its reflection towards the camera on a wet place. */
function lamp(
  scene: Prepared,
  place: Vector,
  view: Vector,
  { nx, ny, nz }: Sample,
  chance: () => number,
): { level: number; sheen: number } {
  const { light } = scene;
  const off = () => (chance() - 0.5) * 2 * light.radiusFt;
  const to: [number, number, number] = [
    light.at[0] + off() - place[0],
    light.at[1] + off() * 0.2 - place[1],
    light.at[2] + off() - place[2],
  ];
  const distance = Math.hypot(...to);
  const direction: Vector = [to[0] / distance, to[1] / distance, to[2] / distance];
  const facing = nx * direction[0] + ny * direction[1] + nz * direction[2];
  if (facing <= 0) return { level: 0, sheen: 0 };
  const from: Vector = [place[0] + nx * 2e-3, place[1] + ny * 2e-3, place[2] + nz * 2e-3];
  if (nearest(scene.casting, from, direction, distance).surface !== null) return { level: 0, sheen: 0 };
  const fall = 1 / (1 + (distance / light.reachFt) ** 2);
  const half = [direction[0] - view[0], direction[1] - view[1], direction[2] - view[2]] as const;
  const length = Math.hypot(...half);
  const shine = Math.max(0, (nx * half[0] + ny * half[1] + nz * half[2]) / length);
  return { level: facing * fall, sheen: shine ** 60 * 0.9 * fall };
}

/** 1 in the open, less where something is near: one chance direction per pixel, which the eye averages. */
function contact(scene: Prepared, place: Vector, { nx, ny, nz }: Sample, chance: () => number): number {
  const [x, y, z] = [chance() * 2 - 1, chance() * 2 - 1, chance() * 2 - 1];
  const length = Math.hypot(x, y, z) || 1;
  const direction: [number, number, number] = [nx + x / length, ny + y / length, nz + z / length];
  const size = Math.hypot(...direction) || 1;
  const from: Vector = [place[0] + nx * 2e-3, place[1] + ny * 2e-3, place[2] + nz * 2e-3];
  const { t } = nearest(
    scene.surfaces,
    from,
    [direction[0] / size, direction[1] / size, direction[2] / size],
    CONTACT_FT,
  );
  return 0.45 + 0.55 * smoothStep(0, CONTACT_FT, t);
}

function rays({ camera }: Scene, width: number, height: number): (column: number, row: number) => Vector {
  const forward = unit([
    camera.target[0] - camera.at[0],
    camera.target[1] - camera.at[1],
    camera.target[2] - camera.at[2],
  ]);
  const right = unit([forward[2], 0, -forward[0]]);
  const up: Vector = [
    forward[1] * right[2] - forward[2] * right[1],
    forward[2] * right[0] - forward[0] * right[2],
    forward[0] * right[1] - forward[1] * right[0],
  ];
  const reach = Math.tan((camera.fieldOfViewDeg * Math.PI) / 360);
  return (column, row) => {
    const x = ((column / width) * 2 - 1) * reach;
    const y = ((1 - (row / height) * 2) * reach * height) / width;
    return unit([
      forward[0] + right[0] * x + up[0] * y,
      forward[1] + right[1] * x + up[1] * y,
      forward[2] + right[2] * x + up[2] * y,
    ]);
  };
}

function unit([x, y, z]: Vector): Vector {
  const length = Math.hypot(x, y, z) || 1;
  return [x / length, y / length, z / length];
}

/** Linear light to a screen's byte, with highlights rolled off as film does; worked out once for all steps. */
const steps = 4_096;
const brightest = 4;
const bytes = Uint8Array.from({ length: steps + 1 }, (_, step) => {
  const value = (step / steps) ** 2 * brightest;
  const rolled = value / (1 + value * 0.35);
  return Math.min(255, Math.round((rolled * 1.2) ** (1 / 2.2) * 255));
});
const toByte = (value: number): number =>
  bytes[Math.round(Math.sqrt(Math.min(1, Math.max(0, value / brightest))) * steps)] ?? 0;

/** Chance that repeats (xorshift32, Marsaglia 2003). */
function generator(seed: number): () => number {
  let state = seed | 0 || 1;
  return () => {
    state ^= state << 13;
    state ^= state >>> 17;
    state ^= state << 5;
    return (state >>> 0) / 4_294_967_296;
  };
}
