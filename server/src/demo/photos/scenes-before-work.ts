import { chalk, crayon, indoors, lampWhite, paint, shadowless } from './indoor-parts.ts';
import { dashes, lettering, marked, outline, type Stroke } from './marking.ts';
import { concrete, glowing, paintedBlocks, plain, wet, wood } from './materials.ts';
import { smoothStep } from './noise.ts';
import { type Scene, type Surface, type Vector } from './scene.ts';
import { across, along, bar, block, level, rectangle, run, upright } from './surfaces.ts';

/** A room of cast floor and painted block walls, seen from the height of the eyes. */
function room(floor: Surface, depthFt: number, halfWidthFt: number): Surface[] {
  const walls = paintedBlocks('#c9c6ba');
  return [
    floor,
    across(depthFt, { material: walls, facing: -1 }),
    along(-halfWidthFt, { material: walls, facing: 1 }),
    along(halfWidthFt, { material: walls, facing: -1 }),
    level(11, { material: concrete({ color: '#8b8983', age: 0.4, shift: 50 }), facing: -1 }),
  ];
}

/** A suspended slab with the layout of an opening in chalk and paint, and what the scan found. */
export function slabWithLayout(): Scene {
  const bars = [-2.6, -1.5, -0.4, 0.7, 1.8, 2.9].flatMap((u) =>
    dashes([u, 4.6], [u, 10.4], 0.35, crayon('#d8c21f')),
  );
  const across12 = [5.2, 6.4, 7.6, 8.8, 10].flatMap((v) =>
    dashes([-3.4, v], [3.4, v], 0.35, crayon('#d8c21f')),
  );
  const floor = marked(concrete({ color: '#a3a099', age: 0.45 }), [
    ...bars,
    ...across12,
    ...outline([-2, 5.8], [2, 8.8], { ...chalk('#2f6fb5'), pastFt: 1.4 }),
    ...outline([-2, 5.8], [2, 8.8], { ...paint('#d8442c'), pastFt: 0 }),
    ...lettering({ text: 'O1', at: [-0.75, 6.7], heightFt: 1, ...paint('#d8442c', 0.13) }),
    ...lettering({ text: "4'-0", at: [-0.9, 4.95], heightFt: 0.42, ...crayon('#d8442c'), widthFt: 0.05 }),
    ...lettering({
      text: "3'-0",
      at: [2.75, 6.5],
      heightFt: 0.42,
      turnDeg: 90,
      ...crayon('#d8442c'),
      widthFt: 0.05,
    }),
  ]);
  return {
    ...indoors,
    camera: { at: [-1.2, 5.4, 0], target: [0.25, 0.1, 8], fieldOfViewDeg: 66 },
    light: { at: [3.5, 10, 5], radiusFt: 0.9, color: lampWhite, reachFt: 13 },
    surfaces: [
      ...room(level(0, { material: floor, facing: 1 }), 17, 9),
      // A tape laid along the edge, a can of paint and a broom handle left at the wall.
      block([-2, 0, 8.95], [-0.1, 0.02, 9.06], plain('#e2c531', { gloss: 0.4, dirt: 0.1 })),
      block([-0.14, 0, 8.88], [0.12, 0.24, 9.14], plain('#2b2d30')),
      upright({
        x: 2.9,
        z: 9.5,
        y: [0, 0.62],
        radiusFt: [0.11, 0.11],
        material: plain('#d8442c', { gloss: 0.5 }),
      }),
      upright({ x: 2.9, z: 9.5, y: [0.62, 0.72], radiusFt: [0.07, 0.05], material: plain('#eeeeea') }),
      bar([5.6, 0, 15.5], [6.1, 5, 16.9], 0.05, wood('#b98d54')),
      block([4.9, 0, 15.3], [6.3, 0.35, 15.6], plain('#3a3f2f')),
      block([-8.6, 0, 12], [-5.6, 2.4, 15.5], wood('#b79563')),
      level(10.95, {
        material: glowing('#fff6e4', 1.6),
        facing: -1,
        bounds: { u: [2.2, 4.8], v: [4.6, 5.6] },
      }),
    ].map(unshadowedLamp),
  };
}

/** The lamp's own panel would shade everything under it. */
function unshadowedLamp(surface: Surface, index: number, all: readonly Surface[]): Surface {
  return index === all.length - 1 ? { ...surface, castsShadow: false } : surface;
}

/** A cast wall with a door's opening marked on it, its form ties and pour lines showing. */
export function wallWithMarkedOpening(): Scene {
  const cast = concrete({ color: '#a8a69f', age: 0.7, shift: 21 });
  const orange = paint('#e0701f', 0.1);
  const ties: Stroke[] = [-7, -3, 1, 5, 9].flatMap((u) =>
    [2, 6, 10].map((v) => ({
      points: [
        [u, v],
        [u + 0.01, v],
      ] as const,
      widthFt: 0.16,
      color: '#4c4a46',
      wear: 0,
      spray: 0,
    })),
  );
  const pours: Stroke[] = [4, 8].map((v) => ({
    points: [
      [-14, v],
      [14, v + 0.02],
    ],
    widthFt: 0.03,
    color: '#6d6b65',
    wear: 0.3,
    spray: 0.1,
  }));
  const wall = marked(cast, [
    ...ties,
    ...pours,
    ...outline([-1.6, 0.02], [3.6, 7.6], { ...chalk('#2f6fb5'), pastFt: 0.9 }),
    ...outline([-1.6, 0], [3.6, 7.6], { ...orange, pastFt: 0 }),
    {
      points: [
        [-1.6, 0],
        [3.6, 7.6],
      ],
      ...orange,
      widthFt: 0.06,
    },
    {
      points: [
        [3.6, 0],
        [-1.6, 7.6],
      ],
      ...orange,
      widthFt: 0.06,
    },
    ...lettering({ text: 'W1', at: [-0.4, 5.7], heightFt: 1, ...paint('#e0701f', 0.13) }),
    ...lettering({
      text: 'SAW THIS SIDE',
      at: [-4.95, 6.5],
      heightFt: 0.26,
      ...crayon('#1d2125'),
      widthFt: 0.045,
    }),
    ...[3.9, 5.1].flatMap((v) => dashes([-1.6, v], [3.6, v + 0.05], 0.3, crayon('#d8c21f'))),
  ]);
  return {
    ...indoors,
    camera: { at: [-3.4, 5.3, -11.5], target: [0.6, 4.1, 0], fieldOfViewDeg: 62 },
    light: { at: [-5.5, 10.2, -6.5], radiusFt: 0.9, color: [1.3, 1.22, 1.08], reachFt: 13 },
    surfaces: [
      level(0, { material: concrete({ color: '#8f8c85', age: 0.6, shift: 5 }), facing: 1 }),
      across(0, { material: wall, facing: -1 }),
      along(9, { material: paintedBlocks('#b9bcb4'), facing: -1 }),
      level(12, { material: concrete({ color: '#7c7a75', age: 0.4, shift: 60 }), facing: -1 }),
      run(
        [
          [-14, 9.6, -0.25],
          [5.6, 9.6, -0.25],
          [5.6, 6.2, -0.25],
        ],
        0.06,
        plain('#9aa0a3', { gloss: 0.6 }),
      ),
      block([5.3, 5.4, -0.3], [5.9, 6.2, 0], plain('#8b9194', { gloss: 0.4 })),
      // A lift platform's mast and rail stand ready.
      block([-8.6, 0, -4.2], [-6.2, 0.9, -1.8], plain('#d98b25', { gloss: 0.4, dirt: 0.5 })),
      block([-8.4, 0.9, -4], [-6.4, 3.6, -2], plain('#3f444a', { dirt: 0.4 })),
      block([-8.6, 3.6, -4.2], [-6.2, 3.75, -1.8], plain('#d98b25', { gloss: 0.4 })),
      block([4.9, 0, -1.7], [7.8, 0.3, -0.4], wood('#b98d54')),
      block([5.2, 0.3, -1.6], [7.5, 0.6, -0.5], wood('#a97f49')),
    ],
  };
}

/** The way in: a corridor with boards laid down and a double door at its end. */
export function accessPath(): Scene {
  const walls = paintedBlocks('#cfccbf');
  const doorGrey = plain('#5d6f78', { gloss: 0.3, dirt: 0.25 });
  const floor = marked(concrete({ color: '#98958d', age: 0.5, shift: 31 }), [
    {
      points: [
        [-2.4, 0],
        [-2.4, 40],
      ],
      widthFt: 0.16,
      color: '#d9b92c',
      wear: 0.42,
      spray: 0.1,
    },
    {
      points: [
        [2.4, 0],
        [2.4, 40],
      ],
      widthFt: 0.16,
      color: '#d9b92c',
      wear: 0.42,
      spray: 0.1,
    },
  ]);
  const lamps = [4, 12, 20, 28].map((z) =>
    shadowless(
      level(8.95, {
        material: glowing('#fff8ea', 1.9),
        facing: -1,
        bounds: { u: [-0.5, 0.5], v: [z, z + 4] },
      }),
    ),
  );
  const boards = [2, 10.1, 18.2].map((z) => block([-1.9, 0, z], [1.9, 0.06, z + 8], wood('#c39a63')));
  return {
    ...indoors,
    ambient: [0.42, 0.42, 0.41],
    camera: { at: [-0.9, 5.3, -2], target: [0.2, 3.7, 20], fieldOfViewDeg: 66 },
    light: { at: [0.4, 8.4, 12], radiusFt: 1.2, color: [1.2, 1.16, 1.05], reachFt: 15 },
    surfaces: [
      level(0, { material: floor, facing: 1 }),
      along(-3.6, { material: walls, facing: 1 }),
      along(3.6, { material: walls, facing: -1 }),
      level(9, { material: concrete({ color: '#a9a79f', age: 0.2, shift: 70 }), facing: -1 }),
      across(32, { material: walls, facing: -1, cutouts: [rectangle([0.1, 3], [-1, 7.2])] }),
      // Daylight behind the leaf that stands open.
      shadowless(across(33.5, { material: glowing('#dfeaf2', 1.5), facing: -1 })),
      block([-2.8, 0, 31.75], [0.05, 7.2, 31.95], doorGrey),
      block([3, 0, 29.2], [3.2, 7.2, 31.9], doorGrey),
      block([-3, 7.2, 31.7], [3.2, 7.5, 32], plain('#48545a')),
      block([-0.35, 3.1, 31.6], [-0.1, 3.5, 31.75], plain('#b9bcbd', { gloss: 0.8 })),
      ...boards,
      run(
        [
          [-3.45, 7.9, 0],
          [-3.45, 7.9, 32],
        ],
        0.1,
        plain('#a23b2f', { gloss: 0.4 }),
      ),
      run(
        [
          [3.4, 8.3, 0],
          [3.4, 8.3, 32],
        ],
        0.16,
        plain('#b8bcbc', { gloss: 0.6 }),
      ),
      block([-3.58, 4.6, 12], [-3.1, 6.2, 13], plain('#a33027', { gloss: 0.5 })),
      block([2.2, 0, 24], [3.4, 3.4, 26], wood('#b08a57')),
      ...lamps,
    ],
  };
}

/** What the site gives: a hose bibb with a hose and the panel beside it. */
export function waterAndPower(): Scene {
  const wall = marked(paintedBlocks('#bfc3b6'), [
    ...lettering({ text: '480V', at: [3.35, 5.2], heightFt: 0.3, ...crayon('#1d2125'), widthFt: 0.045 }),
  ]);
  const brass = plain('#b5893c', { gloss: 0.9, dirt: 0.3 });
  const copper = plain('#a4623c', { gloss: 0.8, dirt: 0.3 });
  const hose = plain('#2e5f46', { gloss: 0.35, dirt: 0.3 });
  const bibb: Vector = [-1.9, 2.9, -0.45];
  return {
    ...indoors,
    camera: { at: [-1.4, 5, -9.8], target: [0, 2.9, 0], fieldOfViewDeg: 58 },
    light: { at: [-3.2, 9.2, -6], radiusFt: 0.8, color: [1.35, 1.26, 1.1], reachFt: 11 },
    surfaces: [
      level(0, {
        material: wet(concrete({ color: '#8f8c85', age: 0.6, shift: 44 }), puddle(-1.7, -1.2, 1.3)),
        facing: 1,
      }),
      across(0, { material: wall, facing: -1 }),
      run(
        [
          [-1.9, 9.5, -0.14],
          [-1.9, 2.9, -0.14],
        ],
        0.055,
        copper,
      ),
      bar([-1.9, 2.9, -0.02], bibb, 0.06, brass),
      bar(bibb, [-1.9, 2.55, -0.56], 0.065, brass),
      bar([-1.9, 3.02, -0.34], [-1.9, 3.3, -0.34], 0.028, brass),
      ...handWheel([-1.9, 3.32, -0.34], 0.17),
      run(
        [
          [-1.9, 2.55, -0.56],
          [-1.92, 2.1, -0.66],
          [-1.98, 1.2, -0.62],
          [-2.1, 0.5, -0.7],
          [-2.5, 0.1, -1],
        ],
        0.05,
        hose,
      ),
      coil([-3, 0.06, -1.5], hose),
      // The panel: box, door, handle, conduits above.
      block([0.7, 3.2, -0.55], [2.9, 7, 0], plain('#8e989c', { gloss: 0.35 })),
      block([0.8, 3.3, -0.62], [2.8, 6.9, -0.55], plain('#9ca6aa', { gloss: 0.4 })),
      block([0.92, 4.9, -0.74], [1.04, 5.5, -0.62], plain('#2b2d30', { gloss: 0.6 })),
      block([1.5, 5.9, -0.635], [2.3, 6.5, -0.62], plain('#e0c22a', { gloss: 0.3 })),
      ...[1.2, 1.8, 2.4].map((x) =>
        run(
          [
            [x, 10, -0.25],
            [x, 7, -0.25],
          ],
          0.09,
          plain('#9aa0a3', { gloss: 0.6 }),
        ),
      ),
      block([3.4, 4.1, -0.4], [4, 4.9, 0], plain('#c7502e', { gloss: 0.4 })),
      run(
        [
          [2.9, 4.5, -0.2],
          [3.4, 4.5, -0.2],
        ],
        0.05,
        plain('#9aa0a3', { gloss: 0.6 }),
      ),
    ],
  };
}

function handWheel([x, y, z]: Vector, radius: number): Surface[] {
  const red = plain('#b3261e', { gloss: 0.5, dirt: 0.3 });
  const rim = Array.from({ length: 13 }, (_, n): Vector => {
    const angle = (n * Math.PI) / 6;
    return [x + Math.cos(angle) * radius, y, z + Math.sin(angle) * radius];
  });
  const spokes = [0, 1, 2].map((n) => bar([x, y, z], rim[n * 4] ?? [x, y, z], 0.022, red));
  return [run(rim, 0.03, red), ...spokes];
}

function coil([x, y, z]: Vector, material: Parameters<typeof bar>[3]): Surface {
  const turns = Array.from({ length: 49 }, (_, n): Vector => {
    const angle = (n * Math.PI) / 8;
    const radius = 0.78 - (n / 49) * 0.34;
    return [x + Math.cos(angle) * radius, y + Math.floor(n / 16) * 0.07, z + Math.sin(angle) * radius * 0.9];
  });
  return run(turns, 0.05, material);
}

const puddle = (u0: number, v0: number, radiusFt: number) => (u: number, v: number) =>
  1 - smoothStep(radiusFt * 0.3, radiusFt * 1.2, Math.hypot(u - u0, v - v0));
