import { ink, type Pdf, type Point } from './sheet.ts';

/** The same places at every run: a small linear congruential generator (Numerical Recipes' constants). */
export function repeatable(seed: number): () => number {
  let state = seed >>> 0;
  return () => {
    state = (Math.imul(state, 1_664_525) + 1_013_904_223) >>> 0;
    return state / 2 ** 32;
  };
}

interface Box {
  x: number;
  y: number;
  width: number;
  height: number;
}

/** Concrete in section: dots and small open triangles. */
export function hatchConcrete(doc: Pdf, box: Box, seed = 7): void {
  const next = repeatable(seed);
  doc.save().rect(box.x, box.y, box.width, box.height).clip();
  doc.rect(box.x, box.y, box.width, box.height).fill(ink.concrete);
  const count = Math.min(2400, Math.round((box.width * box.height) / 34));
  for (let n = 0; n < count; n += 1) {
    const at: Point = [box.x + next() * box.width, box.y + next() * box.height];
    if (next() < 0.86) doc.circle(at[0], at[1], 0.35 + next() * 0.3).fill(ink.soft);
    else pebble(doc, at, 1.4 + next() * 1.6, next() * 6.3);
  }
  doc.restore();
}

function pebble(doc: Pdf, [x, y]: Point, radius: number, turn: number): void {
  const corners = [0, 2.1, 4.2].map((angle): [number, number] => [
    x + radius * Math.cos(angle + turn),
    y + radius * Math.sin(angle + turn),
  ]);
  doc
    .lineWidth(0.35)
    .polygon(...corners)
    .stroke(ink.soft);
}

/** Parallel slanted lines, for earth, partitions and what is to come out. */
export function hatchLines(
  doc: Pdf,
  box: Box,
  { gap = 5, color = ink.faint, width = 0.4 }: { gap?: number; color?: string; width?: number } = {},
): void {
  doc.save().rect(box.x, box.y, box.width, box.height).clip().lineWidth(width).strokeColor(color);
  for (let x = box.x - box.height; x < box.x + box.width; x += gap) {
    doc.moveTo(x, box.y + box.height).lineTo(x + box.height, box.y);
  }
  doc.stroke().restore();
}

/** Ground in section: short strokes in changing directions below a line. */
export function hatchEarth(doc: Pdf, box: Box, seed = 3): void {
  const next = repeatable(seed);
  doc.save().rect(box.x, box.y, box.width, box.height).clip().lineWidth(0.5).strokeColor(ink.soft);
  for (let x = box.x; x < box.x + box.width; x += 15) {
    for (let y = box.y + 3; y < box.y + box.height; y += 13) {
      const slant = next() < 0.5 ? 1 : -1;
      for (let line = 0; line < 3; line += 1) {
        const start = x + line * 3 + next() * 2;
        doc.moveTo(start, y).lineTo(start + slant * 6, y + 6);
      }
    }
  }
  doc.stroke().restore();
}
