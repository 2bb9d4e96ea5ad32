import { hash2, layeredNoise, noise, smoothStep } from './noise.ts';
import { rgb, type Material, type Rgb, type Sample } from './scene.ts';

const mortar = rgb('#b9b4a8');
const binder = rgb('#6d6c6a');
const paleStone = rgb('#a9a49b');
const slurryGrey = rgb('#a8a49b');

function set(sample: Sample, color: Rgb, factor: number): void {
  sample.r = color[0] * factor;
  sample.g = color[1] * factor;
  sample.b = color[2] * factor;
}

function mix(sample: Sample, color: Rgb, share: number): void {
  sample.r += (color[0] - sample.r) * share;
  sample.g += (color[1] - sample.g) * share;
  sample.b += (color[2] - sample.b) * share;
}

/** Grain finer than a pixel would only sparkle. */
const fineAt = (distance: number, nearFt: number): number => 1 - smoothStep(nearFt, nearFt * 4, distance);

interface Concrete {
  color: string;
  /** 0 new and even … 1 old, stained and cracked. */
  age: number;
  /** Moves the pattern, so that two slabs are not the same slab. */
  shift?: number;
}

/** Cast concrete: clouds of cement, trowel marks, pores, hair cracks with age. */
export function concrete({ color, age, shift = 0 }: Concrete): Material {
  const base = rgb(color);
  const stain = rgb('#5b5348');
  return (sample, u, v, distance) => {
    const [x, y] = [u + shift, v + shift * 0.7];
    const clouds = layeredNoise(x * 0.28, y * 0.28, 4);
    const patches = layeredNoise(x * 1.7 + 40, y * 1.7, 3);
    const trowel = noise(x * 9 + noise(x, y) * 6, y * 1.6);
    const grain = noise(x * 55, y * 55) - 0.5;
    const fine = fineAt(distance, 7);
    set(
      sample,
      base,
      0.72 + clouds * 0.38 + (patches - 0.5) * 0.22 + (trowel - 0.5) * 0.07 + grain * 0.14 * fine,
    );
    mix(sample, stain, smoothStep(0.6, 0.82, layeredNoise(x * 0.5 + 9, y * 0.5 + 4, 4)) * 0.5 * age);
    const pore = noise(x * 21 + 3, y * 21);
    if (pore > 0.86) mix(sample, [0.05, 0.05, 0.05], smoothStep(0.86, 0.95, pore) * 0.5 * fine);
    if (age > 0.3) mix(sample, [0.03, 0.03, 0.03], crackAt(x * 0.11 + 80, y * 0.11 + 2) * age * 0.8);
    sample.gloss = 0.06;
  };
}

/** Thin wandering lines: where slow noise passes its middle, broken off where other noise is low. */
function crackAt(x: number, y: number): number {
  const gap = Math.abs(layeredNoise(x, y, 6) - 0.5);
  if (gap > 0.0016) return 0;
  return (1 - gap / 0.0016) * smoothStep(0.5, 0.6, noise(x * 1.3 + 50, y * 1.3));
}

/** A sawn or drilled face: aggregate cut through and polished by the blade. */
export const sawnFace: Material = (sample, u, v, distance) => {
  const cell = nearestStone(u * 11, v * 11);
  const matrix = 0.82 + layeredNoise(u * 8, v * 8, 3) * 0.3;
  set(sample, mortar, matrix);
  if (cell.edge > 0.1)
    mix(sample, stones[cell.kind % stones.length] ?? [0.3, 0.3, 0.3], 0.85 * fineAt(distance, 12));
  const scratch = noise(u * 0.8, v * 90);
  mix(sample, [0.75, 0.73, 0.7], smoothStep(0.7, 0.9, scratch) * 0.25);
  sample.gloss = 0.35;
};

const stones: readonly Rgb[] = [
  rgb('#8d8578'),
  rgb('#6f6f70'),
  rgb('#a89a84'),
  rgb('#c9c4b8'),
  rgb('#7b6a58'),
];

/** The nearest of scattered points and how much nearer it is than the next: the outline of a stone. */
function nearestStone(x: number, y: number): { kind: number; edge: number } {
  let first = Infinity;
  let second = Infinity;
  let kind = 0;
  for (let i = -1; i <= 1; i += 1) {
    for (let j = -1; j <= 1; j += 1) {
      const cx = Math.floor(x) + i;
      const cy = Math.floor(y) + j;
      const distance = Math.hypot(cx + hash2(cx, cy) - x, cy + hash2(cy + 91, cx) - y);
      if (distance < first) {
        [second, first] = [first, distance];
        kind = Math.floor(hash2(cx * 7, cy * 3) * 97);
      } else if (distance < second) second = distance;
    }
  }
  return { kind, edge: second - first };
}

/** Worn asphalt: dark binder, pale stones, oil, patches. */
export const asphalt: Material = (sample, u, v, distance) => {
  const wear = layeredNoise(u * 0.16, v * 0.16, 4);
  set(sample, binder, 0.62 + wear * 0.55 + (layeredNoise(u * 2, v * 2, 3) - 0.5) * 0.25);
  const fine = fineAt(distance, 9);
  const stone = noise(u * 34, v * 34);
  if (stone > 0.62) mix(sample, paleStone, smoothStep(0.62, 0.9, stone) * 0.6 * fine);
  if (stone < 0.3) mix(sample, [0.02, 0.02, 0.02], smoothStep(0.3, 0.1, stone) * 0.7 * fine);
  const oil = layeredNoise(u * 0.6 + 33, v * 0.22 + 5, 3);
  mix(sample, [0.02, 0.02, 0.022], smoothStep(0.62, 0.8, oil) * 0.6);
  mix(sample, [0.01, 0.01, 0.01], crackAt(u * 0.07 + 11, v * 0.07 + 70) * 0.9);
  sample.gloss = 0.05;
};

/** Blocks laid in courses, painted over. */
export function paintedBlocks(color: string): Material {
  const base = rgb(color);
  return (sample, u, v, distance) => {
    const course = Math.floor(v / 0.667);
    const shifted = u + (course % 2 === 0 ? 0 : 0.667);
    const [fu, fv] = [shifted / 1.333 - Math.floor(shifted / 1.333), v / 0.667 - course];
    const edge = Math.min(fu * 1.333, (1 - fu) * 1.333, fv * 0.667, (1 - fv) * 0.667);
    const roughness = (noise(u * 30, v * 30) - 0.5) * 0.12 * fineAt(distance, 8);
    set(sample, base, 0.86 + (layeredNoise(u * 0.4, v * 0.4, 3) - 0.5) * 0.3 + roughness);
    const joint = 1 - smoothStep(0.012, 0.04, edge);
    mix(sample, [base[0] * 0.45, base[1] * 0.45, base[2] * 0.45], joint * 0.75);
    const scuff = layeredNoise(u * 3 + 6, v * 0.9, 3);
    if (v > 0 && v < 3.2)
      mix(sample, [0.06, 0.055, 0.05], smoothStep(0.62, 0.8, scuff) * 0.4 * (1 - v / 3.2));
    sample.gloss = 0.12;
  };
}

/** Planks or plywood. */
export function wood(color: string): Material {
  const base = rgb(color);
  return (sample, u, v) => {
    const ring = noise(u * 1.3 + noise(u * 0.6, v * 2) * 2, v * 22);
    set(sample, base, 0.7 + ring * 0.45 + (layeredNoise(u * 2, v * 2, 3) - 0.5) * 0.3);
    sample.gloss = 0.04;
  };
}

/** Sheet metal with paint, plastic, rubber: one colour with a little dirt. */
export function plain(
  color: string,
  { gloss = 0.3, dirt = 0.2 }: { gloss?: number; dirt?: number } = {},
): Material {
  const base = rgb(color);
  return (sample, u, v) => {
    set(sample, base, 1 - dirt / 2 + (layeredNoise(u * 2.5, v * 2.5, 3) - 0.5) * dirt * 2);
    sample.gloss = gloss;
  };
}

/** A lamp or a bright doorway. */
export function glowing(color: string, strength: number): Material {
  const base = rgb(color);
  return (sample) => {
    set(sample, base, 1);
    sample.glow = strength;
  };
}

/** Water or slurry standing on what is below, where `where` is near 1. */
export function wet(below: Material, where: (u: number, v: number) => number): Material {
  return (sample, u, v, distance) => {
    below(sample, u, v, distance);
    const amount = Math.min(1, Math.max(0, where(u, v) + (layeredNoise(u * 2.2, v * 2.2, 4) - 0.5) * 0.7));
    const film = smoothStep(0.35, 0.6, amount);
    if (film === 0) return;
    const slurry = smoothStep(0.45, 0.75, layeredNoise(u * 3 + 5, v * 3, 4));
    sample.r *= 1 - 0.5 * film;
    sample.g *= 1 - 0.49 * film;
    sample.b *= 1 - 0.46 * film;
    mix(sample, slurryGrey, slurry * film * 0.55);
    sample.gloss = Math.max(sample.gloss, film * (1 - slurry * 0.5));
  };
}

/** The inner side of a hole: less light the deeper it goes. `heightFt` is from its bottom to the surface. */
export function deep(material: Material, heightFt: number): Material {
  return (sample, u, v, distance) => {
    material(sample, u, v, distance);
    const light = 0.16 + 0.84 * Math.min(1, Math.max(0, v / heightFt)) ** 1.6;
    sample.r *= light;
    sample.g *= light;
    sample.b *= light;
  };
}
