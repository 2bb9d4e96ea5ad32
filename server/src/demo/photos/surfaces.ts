import type { Material, Sample, Surface, Vector } from './scene.ts';

const EPSILON = 1e-4;

/** A part of an axis-aligned plane that is not there, and where a ray that passes goes on. */
export interface Cutout {
  contains(u: number, v: number): boolean;
}

interface PlaneOptions {
  material: Material;
  /** In the plane's own `u`, `v`; unbounded when left out. */
  bounds?: { u: readonly [number, number]; v: readonly [number, number] };
  cutouts?: readonly Cutout[];
  /** Which way it faces: 1 towards the axis' greater values. */
  facing: 1 | -1;
}

/** A level plane at a height: `u` is x, `v` is z. */
export const level = (y: number, options: PlaneOptions): Surface => plane('y', y, options);
/** A wall across the view at a depth: `u` is x, `v` is y. */
export const across = (z: number, options: PlaneOptions): Surface => plane('z', z, options);
/** A wall along the view at a side: `u` is z, `v` is y. */
export const along = (x: number, options: PlaneOptions): Surface => plane('x', x, options);

function plane(
  axis: 'x' | 'y' | 'z',
  value: number,
  { material, bounds, cutouts = [], facing }: PlaneOptions,
): Surface {
  const [u0, u1] = bounds?.u ?? [-Infinity, Infinity];
  const [v0, v1] = bounds?.v ?? [-Infinity, Infinity];
  return {
    castsShadow: true,
    hit(ox, oy, oz, dx, dy, dz) {
      const direction = axis === 'x' ? dx : axis === 'y' ? dy : dz;
      if (direction * facing > -1e-7) return Infinity;
      const t = (value - (axis === 'x' ? ox : axis === 'y' ? oy : oz)) / direction;
      if (t < EPSILON) return Infinity;
      const u = axis === 'x' ? oz + dz * t : ox + dx * t;
      const v = axis === 'y' ? oz + dz * t : oy + dy * t;
      if (u < u0 || u > u1 || v < v0 || v > v1) return Infinity;
      for (const cutout of cutouts) if (cutout.contains(u, v)) return Infinity;
      return t;
    },
    shade(sample, x, y, z, distance) {
      sample.nx = axis === 'x' ? facing : 0;
      sample.ny = axis === 'y' ? facing : 0;
      sample.nz = axis === 'z' ? facing : 0;
      material(sample, axis === 'x' ? z : x, axis === 'y' ? z : y, distance);
    },
  };
}

/** A hole with straight sides, such as a saw leaves. */
export function rectangle(u: readonly [number, number], v: readonly [number, number]): Cutout {
  return { contains: (x, y) => x > u[0] && x < u[1] && y > v[0] && y < v[1] };
}

/** A round hole, such as a core drill leaves. */
export function round(u: number, v: number, radiusFt: number): Cutout {
  return { contains: (x, y) => (x - u) ** 2 + (y - v) ** 2 < radiusFt * radiusFt };
}

/** A block; `u`, `v` run over each face in feet from its lower corner. */
export function block(from: Vector, to: Vector, material: Material): Surface {
  const [x1, y1, z1] = from;
  const [x2, y2, z2] = to;
  return {
    castsShadow: true,
    hit(ox, oy, oz, dx, dy, dz) {
      const left = (x1 - ox) / dx;
      const right = (x2 - ox) / dx;
      const below = (y1 - oy) / dy;
      const above = (y2 - oy) / dy;
      const front = (z1 - oz) / dz;
      const back = (z2 - oz) / dz;
      const near = Math.max(Math.min(left, right), Math.min(below, above), Math.min(front, back));
      const far = Math.min(Math.max(left, right), Math.max(below, above), Math.max(front, back));
      return near > far || near < EPSILON ? Infinity : near;
    },
    shade(sample, x, y, z, distance) {
      const [face, sign] = nearestFace([x, y, z], from, to);
      sample.nx = face === 0 ? sign : 0;
      sample.ny = face === 1 ? sign : 0;
      sample.nz = face === 2 ? sign : 0;
      const u = face === 0 ? z - from[2] : x - from[0];
      const v = face === 1 ? z - from[2] : y - from[1];
      material(sample, u, v, distance);
    },
  };
}

function nearestFace(at: Vector, from: Vector, to: Vector): [axis: number, sign: 1 | -1] {
  let best: [number, 1 | -1] = [0, 1];
  let least = Infinity;
  for (let axis = 0; axis < 3; axis += 1) {
    const place = at[axis] ?? 0;
    const low = Math.abs(place - (from[axis] ?? 0));
    const high = Math.abs(place - (to[axis] ?? 0));
    if (low < least) [least, best] = [low, [axis, -1]];
    if (high < least) [least, best] = [high, [axis, 1]];
  }
  return best;
}

interface Upright {
  x: number;
  z: number;
  y: readonly [bottom: number, top: number];
  /** At the bottom and at the top: a cone when they differ. */
  radiusFt: readonly [number, number];
  material: Material;
  /** The inner side of a hole instead of the outer side of a post. */
  inside?: boolean;
  capped?: boolean;
}

/** An upright cylinder or cone: posts, cores, cones on a road; or the wall of a drilled hole. */
export function upright({
  x: cx,
  z: cz,
  y,
  radiusFt,
  material,
  inside = false,
  capped = true,
}: Upright): Surface {
  const slope = (radiusFt[1] - radiusFt[0]) / (y[1] - y[0]);
  const sideHit = (ox: number, oy: number, oz: number, dx: number, dy: number, dz: number): number => {
    const px = ox - cx;
    const pz = oz - cz;
    const radius = radiusFt[0] + slope * (oy - y[0]);
    const a = dx * dx + dz * dz - slope * slope * dy * dy;
    const b = px * dx + pz * dz - slope * dy * radius;
    const c = px * px + pz * pz - radius * radius;
    const root = b * b - a * c;
    if (root < 0 || Math.abs(a) < 1e-9) return Infinity;
    const t = (-b + (inside ? 1 : -1) * Math.sqrt(root)) / a;
    const height = oy + dy * t;
    return t < EPSILON || height < y[0] || height > y[1] ? Infinity : t;
  };
  const capHit = (ox: number, oy: number, oz: number, dx: number, dy: number, dz: number): number => {
    if (inside || !capped || dy >= 0) return Infinity;
    const t = (y[1] - oy) / dy;
    if (t < EPSILON) return Infinity;
    return (ox + dx * t - cx) ** 2 + (oz + dz * t - cz) ** 2 <= radiusFt[1] ** 2 ? t : Infinity;
  };
  return {
    castsShadow: !inside,
    hit: (ox, oy, oz, dx, dy, dz) =>
      Math.min(sideHit(ox, oy, oz, dx, dy, dz), capHit(ox, oy, oz, dx, dy, dz)),
    shade(sample, x, height, z, distance) {
      const onCap = !inside && capped && height > y[1] - 1e-3;
      const length = Math.hypot(x - cx, z - cz) || 1;
      const sign = inside ? -1 : 1;
      sample.nx = onCap ? 0 : (sign * (x - cx)) / length;
      sample.ny = onCap ? 1 : 0;
      sample.nz = onCap ? 0 : (sign * (z - cz)) / length;
      const around = Math.atan2(z - cz, x - cx) * radiusFt[0];
      if (onCap) material(sample, x - cx + 7, z - cz + 7, distance);
      else material(sample, around, height - y[0], distance);
    },
  };
}

/** A round bar between two places: hoses, pipes, handles. */
export function bar(from: Vector, to: Vector, radiusFt: number, material: Material): Surface {
  const axis = [to[0] - from[0], to[1] - from[1], to[2] - from[2]] as const;
  const squared = axis[0] ** 2 + axis[1] ** 2 + axis[2] ** 2;
  const place = (x: number, y: number, z: number) =>
    ((x - from[0]) * axis[0] + (y - from[1]) * axis[1] + (z - from[2]) * axis[2]) / squared;
  return {
    castsShadow: true,
    hit(ox, oy, oz, dx, dy, dz) {
      const px = ox - from[0];
      const py = oy - from[1];
      const pz = oz - from[2];
      const dAxis = (dx * axis[0] + dy * axis[1] + dz * axis[2]) / squared;
      const pAxis = (px * axis[0] + py * axis[1] + pz * axis[2]) / squared;
      const [ex, ey, ez] = [dx - dAxis * axis[0], dy - dAxis * axis[1], dz - dAxis * axis[2]];
      const [qx, qy, qz] = [px - pAxis * axis[0], py - pAxis * axis[1], pz - pAxis * axis[2]];
      const a = ex * ex + ey * ey + ez * ez;
      const b = qx * ex + qy * ey + qz * ez;
      const root = b * b - a * (qx * qx + qy * qy + qz * qz - radiusFt * radiusFt);
      if (root < 0 || a < 1e-9) return Infinity;
      const t = (-b - Math.sqrt(root)) / a;
      const along = pAxis + dAxis * t;
      return t < EPSILON || along < 0 || along > 1 ? Infinity : t;
    },
    shade(sample: Sample, x, y, z, distance) {
      const t = place(x, y, z);
      sample.nx = (x - from[0] - t * axis[0]) / radiusFt;
      sample.ny = (y - from[1] - t * axis[1]) / radiusFt;
      sample.nz = (z - from[2] - t * axis[2]) / radiusFt;
      material(sample, t * Math.sqrt(squared), sample.ny * radiusFt, distance);
    },
  };
}

/** A hose or pipe through several places. */
export function run(places: readonly Vector[], radiusFt: number, material: Material): Surface {
  return group(
    places.slice(1).map((to, index) => bar(places[index] ?? to, to, radiusFt, material)),
    places,
    radiusFt,
  );
}

/** Small parts inside one sphere around `places`: a ray that misses it asks none of them. */
export function group(parts: readonly Surface[], places: readonly Vector[], reachFt: number): Surface {
  const middle = (axis: 0 | 1 | 2) => {
    const values = places.map((place) => place[axis]);
    return (Math.min(...values) + Math.max(...values)) / 2;
  };
  const [cx, cy, cz] = [middle(0), middle(1), middle(2)];
  const radius = reachFt + Math.max(...places.map(([x, y, z]) => Math.hypot(x - cx, y - cy, z - cz)));
  let met = parts[0];
  return {
    castsShadow: true,
    hit(ox, oy, oz, dx, dy, dz) {
      const [px, py, pz] = [cx - ox, cy - oy, cz - oz];
      const ahead = px * dx + py * dy + pz * dz;
      if (px * px + py * py + pz * pz - ahead * ahead > radius * radius) return Infinity;
      let least = Infinity;
      for (const part of parts) {
        const t = part.hit(ox, oy, oz, dx, dy, dz);
        if (t < least) [least, met] = [t, part];
      }
      return least;
    },
    // Asked for the place that was met last.
    shade: (sample, x, y, z, distance) => met?.shade(sample, x, y, z, distance),
  };
}
