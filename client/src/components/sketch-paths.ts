import type { CutSketch, LineRole, SketchedCut } from '@kerfyard/common/cutting';

export interface SketchPaths {
  /** One path a role: a sketch of sixty cuts stays a handful of elements. Feet. */
  lines: Partial<Record<LineRole, string>>;
  cores: string;
  sections: string;
  /** What comes out of the concrete: filled, under the lines. */
  removed: string;
}

const round = (feet: number) => Math.round(feet * 1000) / 1000;

/** Gathers the shapes of a sketch into SVG path data. */
export function sketchPaths(sketch: CutSketch): SketchPaths {
  const lines: Partial<Record<LineRole, string>> = {};
  let cores = '';
  let sections = '';
  let removed = '';
  for (const cut of sketch.cuts) {
    for (const { role, from, to } of cut.lines) {
      lines[role] = `${lines[role] ?? ''}M${round(from.x)} ${round(from.y)}L${round(to.x)} ${round(to.y)}`;
    }
    for (const { role, centre, radiusFt } of cut.circles) {
      const ring = circlePath(centre.x, centre.y, radiusFt);
      if (role === 'core') cores += ring;
      else sections += ring;
    }
    if (cut.kind === 'opening' || cut.kind === 'trench') removed += outline(cut);
  }
  return { lines, cores, sections, removed };
}

function circlePath(x: number, y: number, radius: number): string {
  const r = round(radius);
  return `M${round(x - radius)} ${round(y)}a${r} ${r} 0 1 0 ${2 * r} 0a${r} ${r} 0 1 0 ${-2 * r} 0z`;
}

/** The rectangle inside the overcuts. */
function outline(cut: SketchedCut): string {
  const points = cut.lines
    .filter(({ role }) => role === 'cut' || role === 'edge')
    .flatMap(({ from, to }) => [from, to]);
  if (points.length === 0) return '';
  const xs = points.map((point) => point.x);
  const ys = points.map((point) => point.y);
  const [left, top, right, bottom] = [Math.min(...xs), Math.min(...ys), Math.max(...xs), Math.max(...ys)];
  return `M${round(left)} ${round(top)}H${round(right)}V${round(bottom)}H${round(left)}z`;
}
