/** A repeatable value in 0..1 for two whole numbers: an integer hash, so that a picture is the same at every run. */
export function hash2(x: number, y: number): number {
  let h = Math.imul(x, 374_761_393) + Math.imul(y, 668_265_263);
  h = Math.imul(h ^ (h >>> 13), 1_274_126_177);
  return ((h ^ (h >>> 16)) >>> 0) / 4_294_967_296;
}

/** Value noise: 0..1, smooth, about one bump per unit. */
export function noise(x: number, y: number): number {
  const xi = Math.floor(x);
  const yi = Math.floor(y);
  const fx = x - xi;
  const fy = y - yi;
  const sx = fx * fx * (3 - 2 * fx);
  const sy = fy * fy * (3 - 2 * fy);
  const a = hash2(xi, yi);
  const b = hash2(xi + 1, yi);
  const c = hash2(xi, yi + 1);
  const d = hash2(xi + 1, yi + 1);
  return a + (b - a) * sx + (c - a) * sy + (a - b - c + d) * sx * sy;
}

/** Noise of several sizes on top of each other; 0..1 around 0.5. */
export function layeredNoise(x: number, y: number, octaves: number): number {
  let sum = 0;
  let weight = 0.5;
  let total = 0;
  for (let n = 0; n < octaves; n += 1) {
    sum += noise(x, y) * weight;
    total += weight;
    weight *= 0.5;
    x = x * 2.03 + 17.3;
    y = y * 2.03 + 9.1;
  }
  return sum / total;
}

/** 0 below `from`, 1 above `to`, smooth between. */
export function smoothStep(from: number, to: number, value: number): number {
  const t = Math.min(1, Math.max(0, (value - from) / (to - from)));
  return t * t * (3 - 2 * t);
}
