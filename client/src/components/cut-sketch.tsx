import { cutSketch, CuttingInputError, type Cut, type CutSketch as Sketch } from '@kerfyard/common/cutting';
import { Fragment, useId, useMemo, type ReactNode } from 'react';
import { useTranslation } from 'react-i18next';
import styles from './cut-sketch.module.css';
import { sketchPaths } from './sketch-paths.ts';

interface CutSketchProps {
  cuts: readonly Cut[];
  /** `card`: the face of a scope on a list, without numbers; `full`: numbered as in the cut list, with its note. */
  look?: 'card' | 'full';
  /** How many cuts the list has when `cuts` are only its first ones. */
  cutCount?: number;
  /** Shown while there is nothing that could be drawn: no cut yet, or one half typed. */
  empty?: ReactNode;
}

const MAX_CUTS = 60;
/** Sentences of a card's text equivalent; the rest is on the scope's page. */
const CARD_SENTENCES = 5;
const HEIGHT_PX = { card: 132, full: 340 };

/**
 * The cut list drawn to scale: the face of a scope. Saw lines are kerfs, two strokes with a gap; overcuts run past the
 * corners; cross cuts are dashed. The drawing has a text equivalent, one sentence a cut.
 */
export function CutSketch({ cuts, look = 'full', cutCount = cuts.length, empty = null }: CutSketchProps) {
  const sketch = useSketch(cuts);
  const { t } = useTranslation();
  const id = useId();
  if (sketch === null) return <div className={`${styles.ground} ${styles[look]}`}>{empty}</div>;
  const { box } = sketch;
  const aspect = box.width / box.height;
  const text = look === 'card' ? cardText(sketch) : sketch.text;
  const left = cutCount - Math.min(cutCount, look === 'card' ? CARD_SENTENCES : sketch.cuts.length);
  return (
    <figure className={`${styles.ground} ${styles[look]}`}>
      <div
        className={styles.stage}
        style={{ width: `min(100%, ${HEIGHT_PX[look] * aspect}px)`, aspectRatio: aspect }}
      >
        <Drawing sketch={sketch} label={t('sketch.label', { count: cutCount })} describedBy={id} />
        <At x={sketch.bar.line.to.x} y={sketch.bar.line.to.y} box={box} className={styles.barLabel}>
          {sketch.bar.label}
        </At>
        {look === 'full' &&
          sketch.cuts.map((cut) => (
            <Fragment key={cut.index}>
              <At x={cut.box.x} y={cut.box.y} box={box} className={styles.number}>
                {cut.index + 1}
              </At>
              {cut.count > 1 && (
                <At
                  x={cut.box.x + cut.box.width}
                  y={cut.box.y + cut.box.height}
                  box={box}
                  className={styles.times}
                >
                  × {cut.count}
                </At>
              )}
            </Fragment>
          ))}
      </div>
      {look === 'full' && <figcaption className={styles.note}>{sketch.note}</figcaption>}
      <ul id={id} className="k-hidden">
        {text.map((sentence) => (
          <li key={sentence}>{sentence}</li>
        ))}
        {look === 'card' && left > 0 && <li>{t('sketch.more', { count: left })}</li>}
      </ul>
    </figure>
  );
}

/** A sketch for people who do not see it; for a card its first sentences only. */
function cardText(sketch: Sketch): readonly string[] {
  return sketch.text.slice(0, Math.min(CARD_SENTENCES, sketch.cuts.length));
}

function useSketch(cuts: readonly Cut[]): Sketch | null {
  return useMemo(() => {
    if (cuts.length === 0) return null;
    try {
      return cutSketch(cuts, { maxCuts: MAX_CUTS });
    } catch (error) {
      // A number half typed: there is nothing to draw until it is whole.
      if (error instanceof CuttingInputError) return null;
      throw error;
    }
  }, [cuts]);
}

function Drawing({ sketch, label, describedBy }: { sketch: Sketch; label: string; describedBy: string }) {
  const { lines, cores, sections, removed } = useMemo(() => sketchPaths(sketch), [sketch]);
  const { from, to } = sketch.bar.line;
  const tick = sketch.box.height * 0.02;
  return (
    <svg
      className={styles.drawing}
      viewBox={`0 0 ${sketch.box.width} ${sketch.box.height}`}
      role="img"
      aria-label={label}
      aria-describedby={describedBy}
    >
      <path d={removed} className={styles.removed} />
      <path d={lines.edge ?? ''} className={styles.edge} />
      <path d={lines.joint ?? ''} className={styles.joint} />
      <path d={lines.cross_cut ?? ''} className={styles.crossCut} />
      <path d={lines.overcut ?? ''} className={styles.overcut} />
      <path d={lines.cut ?? ''} className={styles.kerf} />
      <path d={lines.cut ?? ''} className={styles.kerfGap} />
      <path d={cores} className={styles.core} />
      <path d={sections} className={styles.section} />
      <path
        d={`M${from.x} ${from.y - tick}v${2 * tick}M${from.x} ${from.y}H${to.x}M${to.x} ${to.y - tick}v${2 * tick}`}
        className={styles.bar}
      />
    </svg>
  );
}

/** Words on the drawing at a place in feet: ordinary text, so that it keeps its size whatever the scale. */
function At(props: {
  x: number;
  y: number;
  box: Sketch['box'];
  className: string | undefined;
  children: ReactNode;
}) {
  return (
    <span
      aria-hidden="true"
      className={props.className}
      style={{
        left: `${(props.x / props.box.width) * 100}%`,
        top: `${(props.y / props.box.height) * 100}%`,
      }}
    >
      {props.children}
    </span>
  );
}
