import { chalk, indoors, lampWhite, paint, shadowless } from './indoor-parts.ts';
import { lettering, marked, outline, type Stroke } from './marking.ts';
import { concrete, deep, glowing, paintedBlocks, plain, sawnFace, wet, wood } from './materials.ts';
import { smoothStep } from './noise.ts';
import type { Scene, Vector } from './scene.ts';
import { across, along, block, level, rectangle, round, run, upright } from './surfaces.ts';

/** Four cored holes in a wet slab, a core standing beside them. */
export function coresAfterDrilling(): Scene {
  const holes: [number, number][] = [
    [-1.1, 5.6],
    [0.1, 5.6],
    [1.3, 5.6],
    [0.1, 6.8],
  ];
  const radiusFt = 0.3;
  const dry = marked(
    concrete({ color: '#a3a099', age: 0.4, shift: 15 }),
    holes.flatMap(([u, v]) => outline([u, v], [u, v], { ...chalk('#2f6fb5'), pastFt: 0.75 })),
  );
  const marks = marked(
    dry,
    lettering({ text: 'K1', at: [-2.7, 6.2], heightFt: 0.6, ...paint('#d8442c', 0.09) }),
  );
  const soaked = wet(marks, (u, v) => 1.05 - smoothStep(0.4, 2.1, Math.hypot(u - 0.1, (v - 6) * 0.8)));
  return {
    ...indoors,
    camera: { at: [-0.9, 4.7, 1.2], target: [0.2, 0, 6], fieldOfViewDeg: 58 },
    light: { at: [4, 9.5, 8.5], radiusFt: 0.8, color: lampWhite, reachFt: 12 },
    surfaces: [
      level(0, { material: soaked, facing: 1, cutouts: holes.map(([u, v]) => round(u, v, radiusFt)) }),
      ...holes.map(([x, z]) =>
        upright({
          x,
          z,
          y: [-0.67, 0],
          radiusFt: [radiusFt, radiusFt],
          material: deep(sawnFace, 0.67),
          inside: true,
        }),
      ),
      level(-6, { material: concrete({ color: '#55524c', age: 0.5, shift: 12 }), facing: 1 }),
      across(15, { material: paintedBlocks('#c9c6ba'), facing: -1 }),
      ...(
        [
          [2.5, 7.3],
          [3.1, 6.7],
          [2.35, 6.5],
        ] as const
      ).map(([x, z]) => upright({ x, z, y: [0, 0.67], radiusFt: [0.28, 0.28], material: sawnFace })),
      // The slurry vacuum's hose lies across.
      run(
        [
          [-4.2, 0.1, 7.6],
          [-3.2, 0.1, 8.3],
          [-1.8, 0.1, 8.5],
          [-0.6, 0.1, 8.1],
          [0.4, 0.1, 8.2],
        ],
        0.1,
        plain('#3a3d40', { dirt: 0.5 }),
      ),
    ],
  };
}

/** An opening sawn and taken out, its edges wet, boards and a rail around it. */
export function openingAfterSawing(): Scene {
  const [u, v] = [
    [-2, 2],
    [6, 9],
  ] as const;
  const cuts: Stroke[] = outline([u[0], v[0]], [u[1], v[1]], {
    widthFt: 0.03,
    color: '#1b1a18',
    wear: 0,
    spray: 0,
    pastFt: 0.7,
  });
  const dry = marked(concrete({ color: '#a3a099', age: 0.4, shift: 8 }), [
    ...lettering({ text: 'O1', at: [-3.9, 7], heightFt: 0.7, ...paint('#d8442c', 0.1) }),
    ...cuts,
  ]);
  const near = (a: number, b: number) => Math.max(Math.abs(a) - 2, Math.abs(b - 7.5) - 1.5, 0);
  const top = wet(dry, (a, b) => 1.05 - smoothStep(0.2, 1.6, near(a, b)));
  const rail = plain('#d9b92c', { gloss: 0.4, dirt: 0.3 });
  const posts: Vector[] = [
    [-3, 0, 10.2],
    [0, 0, 10.2],
    [3.2, 0, 10.2],
    [3.2, 0, 6],
  ];
  return {
    ...indoors,
    camera: { at: [-1.8, 5.6, 0.8], target: [0.3, -0.1, 7.8], fieldOfViewDeg: 62 },
    light: { at: [4.5, 10, 5], radiusFt: 0.9, color: lampWhite, reachFt: 13 },
    surfaces: [
      level(0, { material: top, facing: 1, cutouts: [rectangle(u, v)] }),
      across(v[1], { material: sawnFace, facing: -1, bounds: { u, v: [-0.67, 0] } }),
      across(v[0], { material: sawnFace, facing: 1, bounds: { u, v: [-0.67, 0] } }),
      along(u[0], { material: sawnFace, facing: 1, bounds: { u: v, v: [-0.67, 0] } }),
      along(u[1], { material: sawnFace, facing: -1, bounds: { u: v, v: [-0.67, 0] } }),
      level(-9, { material: plain('#4a4843', { gloss: 0.05, dirt: 0.5 }), facing: 1 }),
      across(14, {
        material: plain('#2e2d2b', { gloss: 0.02 }),
        facing: -1,
        bounds: { u: [-20, 20], v: [-9, -0.67] },
      }),
      across(16, { material: paintedBlocks('#c9c6ba'), facing: -1 }),
      along(9, { material: paintedBlocks('#c4c1b5'), facing: -1 }),
      ...posts.map(([x, , z]) => upright({ x, z, y: [0, 3.5], radiusFt: [0.07, 0.07], material: rail })),
      run(
        [
          [-3, 3.5, 10.2],
          [3.2, 3.5, 10.2],
          [3.2, 3.5, 6],
        ],
        0.06,
        rail,
      ),
      run(
        [
          [-3, 1.8, 10.2],
          [3.2, 1.8, 10.2],
          [3.2, 1.8, 6],
        ],
        0.05,
        rail,
      ),
      // The piece, on timbers.
      block([4.6, 0, 7.4], [4.9, 0.35, 10.6], wood('#b98d54')),
      block([7.4, 0, 7.4], [7.7, 0.35, 10.6], wood('#b98d54')),
      block([4.3, 0.35, 7.6], [8, 1.02, 10.5], sawnFace),
      level(1.025, { material: dry, facing: 1, bounds: { u: [4.3, 8], v: [7.6, 10.5] } }),
    ],
  };
}

/** A new warehouse floor with its joints sawn, columns in diamonds. */
export function sawnJoints(): Scene {
  const style = { widthFt: 0.06, color: '#2f2d2a', wear: 0, spray: 0 };
  const joints: Stroke[] = [
    ...[-18, -6, 6, 18].map((u): Stroke => ({
      points: [
        [u, -5],
        [u, 140],
      ],
      ...style,
    })),
    ...[6, 18, 30, 42, 54, 66, 78].map((v): Stroke => ({
      points: [
        [-60, v],
        [60, v],
      ],
      ...style,
    })),
  ];
  const diamonds = [18, 54].flatMap((v) =>
    [-18, 18].map((u): Stroke => ({
      points: [
        [u, v - 2],
        [u + 2, v],
        [u, v + 2],
        [u - 2, v],
        [u, v - 2],
      ],
      ...style,
      widthFt: 0.09,
    })),
  );
  const slab = marked(concrete({ color: '#bdbbb4', age: 0.15, shift: 27 }), [...joints, ...diamonds]);
  const dusty = wet(
    slab,
    (u, v) => 0.9 - smoothStep(0.05, 0.5, Math.abs(u - 6)) - smoothStep(20, 34, v) * 0.6,
  );
  const steel = plain('#7d8a91', { gloss: 0.4 });
  const lamps = [10, 30, 50].flatMap((z) =>
    [-14, 0, 14].map((x) =>
      shadowless(
        level(21.9, {
          material: glowing('#f4f8ff', 2),
          facing: -1,
          bounds: { u: [x - 1, x + 1], v: [z, z + 3] },
        }),
      ),
    ),
  );
  return {
    ...indoors,
    ambient: [0.45, 0.46, 0.48],
    camera: { at: [1.4, 5.6, -3], target: [3.2, 0.4, 18], fieldOfViewDeg: 72 },
    light: { at: [-2, 18.5, 14], radiusFt: 2, color: [1.1, 1.1, 1.08], reachFt: 28 },
    surfaces: [
      level(0, { material: dusty, facing: 1 }),
      level(22, { material: plain('#8d9296', { gloss: 0.1 }), facing: -1 }),
      across(90, { material: plain('#b9bec0', { gloss: 0.1 }), facing: -1 }),
      along(-34, { material: plain('#b9bec0', { gloss: 0.1 }), facing: 1 }),
      along(34, { material: plain('#b4b9bb', { gloss: 0.1 }), facing: -1 }),
      ...[18, 54].flatMap((z) =>
        [-18, 18].map((x) => block([x - 0.5, 0, z - 0.5], [x + 0.5, 22, z + 0.5], steel)),
      ),
      ...[18, 36, 54, 72].map((z) => block([-34, 19.6, z - 0.3], [34, 21.2, z + 0.3], steel)),
      ...lamps,
    ],
  };
}
