import { noise, smoothStep } from './noise.ts';
import { rgb, type Material, type Rgb } from './scene.ts';

type Spot = readonly [u: number, v: number];

/** A line of paint, chalk or crayon on a surface. */
export interface Stroke {
  points: readonly Spot[];
  widthFt: number;
  color: string;
  /** 0 solid … 1 mostly worn off. */
  wear: number;
  /** 0 a crisp edge … 1 sprayed. */
  spray: number;
}

interface Segment {
  a: Spot;
  b: Spot;
  half: number;
  color: Rgb;
  wear: number;
  spray: number;
  reach: number;
}

/** A material with strokes on it, worn by its grain. */
export function marked(below: Material, strokes: readonly Stroke[]): Material {
  const squares = bySquare(strokes.flatMap(toSegments));
  return (sample, u, v, distance) => {
    below(sample, u, v, distance);
    const near = squares.get(squareOf(u, v));
    if (near === undefined) return;
    for (const segment of near) {
      const gap = distanceTo(segment, u, v);
      if (gap > segment.reach) continue;
      const wobble = (noise(u * 9, v * 9) - 0.5) * segment.half * 0.5;
      const soft = segment.half * (0.25 + segment.spray * 1.6);
      let cover = 1 - smoothStep(segment.half - soft * 0.4, segment.half + soft, gap + wobble);
      const grain = noise(u * 38, v * 38) * 0.65 + noise(u * 7, v * 7) * 0.35;
      cover *= smoothStep(segment.wear - 0.28, segment.wear + 0.12, grain);
      sample.r += (segment.color[0] - sample.r) * cover;
      sample.g += (segment.color[1] - sample.g) * cover;
      sample.b += (segment.color[2] - sample.b) * cover;
    }
  };
}

const squareOf = (u: number, v: number): number => (Math.floor(u) + 4096) * 8192 + Math.floor(v) + 4096;

/** Which segments reach into which square foot. */
function bySquare(segments: readonly Segment[]): Map<number, Segment[]> {
  const squares = new Map<number, Segment[]>();
  for (const segment of segments) {
    const length = Math.hypot(segment.b[0] - segment.a[0], segment.b[1] - segment.a[1]);
    const found = new Set<number>();
    for (let along = 0; along <= length + 0.5; along += 0.5) {
      const t = Math.min(1, along / (length || 1));
      const u = segment.a[0] + (segment.b[0] - segment.a[0]) * t;
      const v = segment.a[1] + (segment.b[1] - segment.a[1]) * t;
      const reach = segment.reach + 0.25;
      for (const du of [-reach, 0, reach])
        for (const dv of [-reach, 0, reach]) found.add(squareOf(u + du, v + dv));
    }
    for (const square of found) squares.set(square, [...(squares.get(square) ?? []), segment]);
  }
  return squares;
}

function toSegments({ points, widthFt, color, wear, spray }: Stroke): Segment[] {
  const half = widthFt / 2;
  const rest = { half, color: rgb(color), wear, spray, reach: half * (2 + spray * 2) };
  return points.slice(1).map((b, index) => ({ a: points[index] ?? b, b, ...rest }));
}

function distanceTo({ a, b }: Segment, u: number, v: number): number {
  const du = b[0] - a[0];
  const dv = b[1] - a[1];
  const t = ((u - a[0]) * du + (v - a[1]) * dv) / (du * du + dv * dv || 1);
  const along = Math.min(1, Math.max(0, t));
  return Math.hypot(u - a[0] - du * along, v - a[1] - dv * along);
}

/** Letters as a hand writes them with a can or a crayon, on a field 4 wide and 6 high. */
const letters: Record<string, readonly (readonly Spot[])[]> = {
  '0': [
    [
      [1, 0],
      [0, 2],
      [0, 4],
      [1, 6],
      [3, 6],
      [4, 4],
      [4, 2],
      [3, 0],
      [1, 0],
    ],
  ],
  '1': [
    [
      [1, 4.6],
      [2.3, 6],
      [2.3, 0],
    ],
  ],
  '2': [
    [
      [0, 4.6],
      [1, 6],
      [3, 6],
      [4, 4.6],
      [0, 0],
      [4, 0],
    ],
  ],
  '3': [
    [
      [0, 6],
      [4, 6],
      [2, 3.6],
      [4, 2.4],
      [3, 0],
      [0, 0.4],
    ],
  ],
  '4': [
    [
      [3, 0],
      [3, 6],
      [0, 2],
      [4, 2],
    ],
  ],
  '5': [
    [
      [4, 6],
      [0.6, 6],
      [0.3, 3.5],
      [3, 3.6],
      [4, 2],
      [3, 0],
      [0, 0.3],
    ],
  ],
  '6': [
    [
      [3.4, 6],
      [0.6, 3],
      [0.3, 1],
      [1.6, 0],
      [3.4, 0.8],
      [3.4, 2.4],
      [1.8, 3.2],
      [0.5, 2.2],
    ],
  ],
  '7': [
    [
      [0, 6],
      [4, 6],
      [1.4, 0],
    ],
  ],
  '8': [
    [
      [2, 3.2],
      [0.3, 4.6],
      [2, 6],
      [3.7, 4.6],
      [2, 3.2],
      [0, 1.4],
      [2, 0],
      [4, 1.4],
      [2, 3.2],
    ],
  ],
  '9': [
    [
      [3.6, 3.6],
      [2, 2.8],
      [0.4, 4.2],
      [1.8, 6],
      [3.6, 5],
      [3.4, 2],
      [1.6, 0],
    ],
  ],
  A: [
    [
      [0, 0],
      [2, 6],
      [4, 0],
    ],
    [
      [0.8, 2.2],
      [3.2, 2.2],
    ],
  ],
  C: [
    [
      [4, 5],
      [2.6, 6],
      [0.6, 5],
      [0, 3],
      [0.8, 1],
      [2.6, 0],
      [4, 1],
    ],
  ],
  E: [
    [
      [4, 6],
      [0, 6],
      [0, 0],
      [4, 0],
    ],
    [
      [0, 3],
      [3, 3],
    ],
  ],
  G: [
    [
      [4, 5],
      [2.6, 6],
      [0.6, 5],
      [0, 3],
      [0.8, 1],
      [2.6, 0],
      [4, 1],
      [4, 2.8],
      [2.4, 2.8],
    ],
  ],
  D: [
    [
      [0, 0],
      [0, 6],
      [2.4, 6],
      [4, 4],
      [4, 2],
      [2.4, 0],
      [0, 0],
    ],
  ],
  H: [
    [
      [0, 0],
      [0, 6],
    ],
    [
      [4, 0],
      [4, 6],
    ],
    [
      [0, 3],
      [4, 3],
    ],
  ],
  I: [
    [
      [2, 0],
      [2, 6],
    ],
  ],
  J: [
    [
      [3.4, 6],
      [3.4, 1.4],
      [2, 0],
      [0.4, 1],
    ],
  ],
  K: [
    [
      [0, 0],
      [0, 6],
    ],
    [
      [4, 6],
      [0, 2.6],
      [4, 0],
    ],
  ],
  O: [
    [
      [1, 0],
      [0, 2],
      [0, 4],
      [1, 6],
      [3, 6],
      [4, 4],
      [4, 2],
      [3, 0],
      [1, 0],
    ],
  ],
  S: [
    [
      [4, 5.2],
      [2.4, 6],
      [0.4, 5],
      [0.8, 3.6],
      [3.4, 2.6],
      [3.6, 1],
      [2, 0],
      [0, 0.8],
    ],
  ],
  T: [
    [
      [0, 6],
      [4, 6],
    ],
    [
      [2, 6],
      [2, 0],
    ],
  ],
  V: [
    [
      [0, 6],
      [2, 0],
      [4, 6],
    ],
  ],
  W: [
    [
      [0, 6],
      [1, 0],
      [2, 4],
      [3, 0],
      [4, 6],
    ],
  ],
  X: [
    [
      [0, 0],
      [4, 6],
    ],
    [
      [0, 6],
      [4, 0],
    ],
  ],
  "'": [
    [
      [1.6, 6],
      [1.2, 4.6],
    ],
  ],
  '"': [
    [
      [1, 6],
      [0.8, 4.6],
    ],
    [
      [2.4, 6],
      [2.2, 4.6],
    ],
  ],
  '-': [
    [
      [0.6, 3],
      [3.2, 3],
    ],
  ],
};

interface Lettering extends Omit<Stroke, 'points'> {
  text: string;
  /** Lower left corner. */
  at: Spot;
  heightFt: number;
  /** Turns the line of writing, counter-clockwise. */
  turnDeg?: number;
}

/** A word written with strokes. */
export function lettering({ text, at, heightFt, turnDeg = 0, ...style }: Lettering): Stroke[] {
  const unit = heightFt / 6;
  const turn = (turnDeg * Math.PI) / 180;
  const place = ([x, y]: Spot, index: number): Spot => {
    const u = (x + index * 5.4) * unit;
    const v = y * unit;
    return [at[0] + u * Math.cos(turn) - v * Math.sin(turn), at[1] + u * Math.sin(turn) + v * Math.cos(turn)];
  };
  return [...text].flatMap((letter, index) =>
    (letters[letter] ?? []).map((points) => ({
      ...style,
      points: points.map((point) => place(point, index)),
    })),
  );
}

/** The outline of a rectangle with its lines run past the corners, as a chalk line leaves them. */
export function outline(
  [u1, v1]: Spot,
  [u2, v2]: Spot,
  { pastFt, ...style }: Omit<Stroke, 'points'> & { pastFt: number },
): Stroke[] {
  const lines: Spot[][] = [
    [
      [u1 - pastFt, v1],
      [u2 + pastFt, v1],
    ],
    [
      [u1 - pastFt, v2],
      [u2 + pastFt, v2],
    ],
    [
      [u1, v1 - pastFt],
      [u1, v2 + pastFt],
    ],
    [
      [u2, v1 - pastFt],
      [u2, v2 + pastFt],
    ],
  ];
  return lines.map((points) => ({ ...style, points }));
}

/** A line broken into dashes. */
export function dashes(from: Spot, to: Spot, dashFt: number, style: Omit<Stroke, 'points'>): Stroke[] {
  const length = Math.hypot(to[0] - from[0], to[1] - from[1]);
  const at = (distance: number): Spot => [
    from[0] + ((to[0] - from[0]) * distance) / length,
    from[1] + ((to[1] - from[1]) * distance) / length,
  ];
  const count = Math.floor(length / (dashFt * 2));
  return Array.from({ length: count }, (_, n) => ({
    ...style,
    points: [at(n * dashFt * 2), at(n * dashFt * 2 + dashFt)],
  }));
}
