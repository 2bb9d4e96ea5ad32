/** Feet; x to the right, y up, z away from the camera. */
export type Vector = readonly [x: number, y: number, z: number];
/** Linear light, 0..1 each. */
export type Rgb = readonly [r: number, g: number, b: number];

/** What a surface is at one place. Reused for every pixel, so that a picture makes no garbage. */
export interface Sample {
  r: number;
  g: number;
  b: number;
  nx: number;
  ny: number;
  nz: number;
  /** 0 dull … 1 wet. */
  gloss: number;
  /** Own light, as of a lamp: added unlit. */
  glow: number;
}

/** Colours a place: `u`, `v` in feet on the surface, `distance` from the camera (fine grain fades with it). */
export type Material = (sample: Sample, u: number, v: number, distance: number) => void;

export interface Surface {
  /** How far along the ray it is met; Infinity when not. */
  hit(ox: number, oy: number, oz: number, dx: number, dy: number, dz: number): number;
  /** Fill the sample at a place of this surface. */
  shade(sample: Sample, x: number, y: number, z: number, distance: number): void;
  /** Lamps and the like throw no shadow. */
  castsShadow: boolean;
}

export interface Scene {
  camera: { at: Vector; target: Vector; fieldOfViewDeg: number };
  surfaces: readonly Surface[];
  /** The lamp or the sun's disc; shadows grow soft with its radius. */
  light: { at: Vector; radiusFt: number; color: Rgb; reachFt: number };
  ambient: Rgb;
  /** What is seen where nothing is met. */
  sky: (dy: number) => Rgb;
}

/** From colours as screens write them (#rrggbb) to linear light. */
export function rgb(hex: string): Rgb {
  const value = Number.parseInt(hex.slice(1), 16);
  const channel = (shift: number) => (((value >> shift) & 255) / 255) ** 2.2;
  return [channel(16), channel(8), channel(0)];
}
