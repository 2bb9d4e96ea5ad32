import type { Box, Point } from '@kerfyard/common/cutting';
import { useId, type ReactNode } from 'react';
import ground from './cut-sketch.module.css';
import styles from './drawing-frame.module.css';

/** Words on a drawing, at a place in the drawing's own unit. */
export interface DrawingLabel {
  readonly at: Point;
  readonly text: string;
  /** Where the words stand from the place; right of it unless told. */
  readonly side?: 'right' | 'left' | 'above' | 'below' | 'centre';
  readonly isLoud?: boolean;
}

interface DrawingFrameProps {
  /** The drawing's own box, in its own unit. */
  box: Box;
  /** What is drawn, for those who do not see it. */
  label: string;
  /** The text equivalent, one sentence each. */
  text: readonly string[];
  /** Shows the text equivalent under the drawing too. */
  showText?: boolean;
  /** The tallest the drawing gets. */
  heightPx?: number;
  labels?: readonly DrawingLabel[];
  /** SVG in the drawing's own unit, with the classes of `drawingStyles`. */
  children: ReactNode;
}

/** Classes for what is drawn: concrete, soil, kerfs, dimension lines. */
export const drawingStyles = styles;

/**
 * A drawing to scale on the concrete ground, its words as ordinary text that keeps its size whatever the scale, and
 * its text equivalent.
 */
export function DrawingFrame(props: DrawingFrameProps) {
  const { box, label, text, showText = false, heightPx = 300, labels = [], children } = props;
  const id = useId();
  const aspect = box.width / box.height;
  return (
    <figure className={`${ground.ground} ${styles.frame}`}>
      <div
        className={styles.stage}
        style={{ width: `min(100%, ${heightPx * aspect}px)`, aspectRatio: aspect }}
      >
        <svg
          className={styles.drawing}
          viewBox={`${box.x} ${box.y} ${box.width} ${box.height}`}
          role="img"
          aria-label={label}
          aria-describedby={id}
        >
          {children}
        </svg>
        {labels.map(({ at, text: words, side = 'right', isLoud = false }, index) => (
          <span
            key={`${words}${index}`}
            aria-hidden="true"
            className={`${styles.label} ${styles[side]} ${isLoud ? styles.loud : ''}`}
            style={{
              left: `${((at.x - box.x) / box.width) * 100}%`,
              top: `${((at.y - box.y) / box.height) * 100}%`,
            }}
          >
            {words}
          </span>
        ))}
      </div>
      <figcaption id={id} className={showText ? styles.text : 'k-hidden'}>
        {text.map((sentence) => (
          <span key={sentence} className={styles.sentence}>
            {sentence}{' '}
          </span>
        ))}
      </figcaption>
    </figure>
  );
}
