import { dashes, lettering, marked, type Stroke } from './marking.ts';
import { asphalt, concrete, plain, sawnFace, wet } from './materials.ts';
import { layeredNoise, smoothStep } from './noise.ts';
import type { Material, Rgb, Scene, Surface } from './scene.ts';
import { across, along, block, level, rectangle, upright } from './surfaces.ts';

/** Bright haze low down, blue above. */
const daySky = (dy: number): Rgb => {
  const high = smoothStep(0, 0.55, dy);
  return [0.82 - high * 0.5, 0.88 - high * 0.36, 0.95 - high * 0.12];
};

const day: Pick<Scene, 'ambient' | 'sky' | 'light'> = {
  ambient: [0.42, 0.47, 0.54],
  sky: daySky,
  light: { at: [-60, 90, -20], radiusFt: 2, color: [1.05, 0.99, 0.86], reachFt: 2_000 },
};

const grass: Material = (sample, u, v) => {
  const blades = layeredNoise(u * 5, v * 5, 4);
  sample.r = 0.06 + blades * 0.12;
  sample.g = 0.1 + blades * 0.2;
  sample.b = 0.03 + blades * 0.05;
};

/** Rows of windows in a dull front. */
function front(wall: string, glass: string): Material {
  const skin = plain(wall, { gloss: 0.05, dirt: 0.3 });
  const pane = plain(glass, { gloss: 0.6, dirt: 0.3 });
  return (sample, u, v, distance) => {
    const [fu, fv] = [u / 7 - Math.floor(u / 7), v / 11 - Math.floor(v / 11)];
    const isPane = fu > 0.25 && fu < 0.75 && fv > 0.3 && fv < 0.75 && v > 2;
    (isPane ? pane : skin)(sample, u, v, distance);
  };
}

function cone(x: number, z: number): Surface[] {
  const orange = plain('#e2591b', { gloss: 0.4, dirt: 0.25 });
  const white = plain('#f0efe9', { gloss: 0.6, dirt: 0.2 });
  const radius = (y: number) => 0.5 - (y / 2.4) * 0.4;
  const part = (from: number, to: number, material: Material) =>
    upright({ x, z, y: [from, to], radiusFt: [radius(from), radius(to)], material });
  return [
    block([x - 0.62, 0, z - 0.62], [x + 0.62, 0.1, z + 0.62], plain('#2b2b2b')),
    part(0.1, 0.9, orange),
    part(0.9, 1.35, white),
    part(1.35, 1.7, orange),
    part(1.7, 2, white),
    part(2, 2.4, orange),
  ];
}

/** What stands along the street on both sides. */
function street(pavement: Surface): Surface[] {
  const walk = concrete({ color: '#b0ada4', age: 0.5, shift: 3 });
  return [
    pavement,
    block([9, -1, -10], [9.6, 0.5, 300], concrete({ color: '#a9a69d', age: 0.6, shift: 33 })),
    level(0.5, { material: walk, facing: 1, bounds: { u: [9.6, 15], v: [-10, 300] } }),
    level(0.48, { material: grass, facing: 1, bounds: { u: [15, 80], v: [-10, 300] } }),
    block([-21, -1, -10], [-20.4, 0.5, 300], concrete({ color: '#a9a69d', age: 0.6, shift: 35 })),
    level(0.5, { material: walk, facing: 1, bounds: { u: [-26, -20.4], v: [-10, 300] } }),
    level(0.48, { material: grass, facing: 1, bounds: { u: [-90, -26], v: [-10, 300] } }),
    block([24, 0, 30], [60, 26, 78], front('#9c5f48', '#31414b')),
    block([26, 0, 92], [64, 34, 150], front('#b8ab92', '#3b4952')),
    block([-70, 0, 20], [-32, 22, 70], front('#8d8f8c', '#2f3d46')),
    block([-80, 0, 84], [-34, 40, 150], front('#a87f5c', '#35434c')),
    along(-120, { material: plain('#8a9a86'), facing: 1, bounds: { u: [150, 400], v: [0, 18] } }),
    across(300, {
      material: plain('#8fa090', { dirt: 0.6 }),
      facing: -1,
      bounds: { u: [-200, 200], v: [0, 16] },
    }),
    ...[20, 70, 120].map((z) =>
      upright({ x: 12, z, y: [0.5, 26], radiusFt: [0.5, 0.35], material: plain('#5c4a38') }),
    ),
  ];
}

const sprayed = (color: string, widthFt: number, wear = 0.22): Omit<Stroke, 'points'> => ({
  color,
  widthFt,
  wear,
  spray: 0.6,
});

/** A street with a trench marked for sawing, utilities marked in their colours, cones out. */
export function trenchMarkedOnPavement(): Scene {
  const white = sprayed('#f2f1ea', 0.14);
  // Colours of the uniform code for marking underground lines (APWA): blue water, yellow gas, green sewer.
  const pavement = marked(asphalt, [
    {
      points: [
        [2, 3],
        [2, 120],
      ],
      ...white,
    },
    {
      points: [
        [5, 3],
        [5, 120],
      ],
      ...white,
    },
    {
      points: [
        [2, 3],
        [5, 3],
      ],
      ...white,
    },
    ...lettering({ text: 'T1', at: [2.75, 6.4], heightFt: 1.3, ...sprayed('#f2f1ea', 0.15) }),
    ...lettering({ text: 'SAW 9', at: [-6.4, 13.5], heightFt: 1, ...sprayed('#f2f1ea', 0.12, 0.3) }),
    ...dashes([7.2, 2], [7.4, 120], 1.6, sprayed('#2c6fd1', 0.16, 0.3)),
    ...lettering({ text: 'W', at: [6.6, 8.4], heightFt: 1, ...sprayed('#2c6fd1', 0.14) }),
    ...dashes([-2.5, 2], [-2.3, 120], 1.6, sprayed('#e3c11c', 0.16, 0.3)),
    ...lettering({ text: 'GAS', at: [-5.6, 24], heightFt: 1.3, ...sprayed('#e3c11c', 0.14) }),
    ...dashes([-6, 30], [-6, 130], 5, { color: '#e9e7df', widthFt: 0.4, wear: 0.4, spray: 0.05 }),
  ]);
  return {
    ...day,
    camera: { at: [0.6, 5.5, -4], target: [2.9, 2, 22], fieldOfViewDeg: 64 },
    surfaces: [
      ...street(level(0, { material: pavement, facing: 1, bounds: { u: [-20.4, 9], v: [-10, 300] } })),
      ...[9, 24, 40, 58].flatMap((z) => cone(0.9 - (z % 7) * 0.05, z)),
    ],
  };
}

/** The same street later: both sides sawn, the trench broken out. */
export function trenchSawn(): Scene {
  const near = (u: number) => Math.min(Math.abs(u - 2), Math.abs(u - 5));
  const lines: Stroke[] = [2, 5].map((u) => ({
    points: [
      [u, 3],
      [u, 120],
    ],
    widthFt: 0.05,
    color: '#15140f',
    wear: 0,
    spray: 0,
  }));
  const pavement = wet(marked(asphalt, lines), (u, v) => (v > 2 ? 1 - smoothStep(0.1, 0.9, near(u)) : 0));
  const soil: Material = (sample, u, v) => {
    const clods = layeredNoise(u * 3, v * 3, 5);
    sample.r = 0.1 + clods * 0.2;
    sample.g = 0.075 + clods * 0.15;
    sample.b = 0.05 + clods * 0.1;
  };
  const trench = [3, 46] as const;
  return {
    ...day,
    camera: { at: [-1.4, 5.6, -3], target: [3.1, 1, 16], fieldOfViewDeg: 64 },
    surfaces: [
      ...street(
        level(0, {
          material: pavement,
          facing: 1,
          bounds: { u: [-20.4, 9], v: [-10, 300] },
          cutouts: [rectangle([2, 5], trench)],
        }),
      ),
      along(2, { material: sawnFace, facing: 1, bounds: { u: trench, v: [-0.75, 0] } }),
      along(5, { material: sawnFace, facing: -1, bounds: { u: trench, v: [-0.75, 0] } }),
      across(trench[1], { material: sawnFace, facing: -1, bounds: { u: [2, 5], v: [-0.75, 0] } }),
      along(2, { material: soil, facing: 1, bounds: { u: trench, v: [-3, -0.75] } }),
      along(5, { material: soil, facing: -1, bounds: { u: trench, v: [-3, -0.75] } }),
      across(trench[1], { material: soil, facing: -1, bounds: { u: [2, 5], v: [-3, -0.75] } }),
      level(-2.2, { material: soil, facing: 1, bounds: { u: [2, 5], v: trench } }),
      ...[9, 24, 40, 58].flatMap((z) => cone(-0.6, z)),
    ],
  };
}
