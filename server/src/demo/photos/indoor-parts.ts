import type { Stroke } from './marking.ts';
import type { Rgb, Scene, Surface } from './scene.ts';

/** Lamps only, grey light from all around. */
export const indoors: Pick<Scene, 'ambient' | 'sky'> = {
  ambient: [0.34, 0.35, 0.37],
  sky: (): Rgb => [0.02, 0.02, 0.02],
};
export const lampWhite: Rgb = [1.15, 1.08, 0.96];

/** Marking paint from a can. */
export const paint = (color: string, widthFt = 0.11): Omit<Stroke, 'points'> => ({
  color,
  widthFt,
  wear: 0.2,
  spray: 0.7,
});
/** A snapped chalk line. */
export const chalk = (color: string): Omit<Stroke, 'points'> => ({
  color,
  widthFt: 0.025,
  wear: 0.42,
  spray: 0.3,
});
/** Lumber crayon. */
export const crayon = (color: string): Omit<Stroke, 'points'> => ({
  color,
  widthFt: 0.035,
  wear: 0.38,
  spray: 0.15,
});

/** A lamp's panel would shade everything under it. */
export const shadowless = (surface: Surface): Surface => ({ ...surface, castsShadow: false });
