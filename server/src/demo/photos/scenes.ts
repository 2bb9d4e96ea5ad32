import type { Scene } from './scene.ts';
import { coresAfterDrilling, openingAfterSawing, sawnJoints } from './scenes-after-work.ts';
import { accessPath, slabWithLayout, wallWithMarkedOpening, waterAndPower } from './scenes-before-work.ts';
import { trenchMarkedOnPavement, trenchSawn } from './scenes-outdoors.ts';

/** The demo's pictures, by what they show. */
export const demoScenes = {
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
export type DemoPhotoName = keyof typeof demoScenes;
