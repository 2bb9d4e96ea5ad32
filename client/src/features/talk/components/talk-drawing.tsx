import styles from './talk.module.css';

/** What the page will hold: entries of two sides, words and a photo of a marked wall. Decoration beside words. */
export function TalkDrawing() {
  return (
    <svg viewBox="0 0 340 120" className={styles.drawing} aria-hidden="true" focusable="false">
      <g fill="none" stroke="var(--k-line-strong)" strokeWidth="2" strokeLinecap="round">
        <path d="M28 18h70M28 32h150" />
        <path d="M28 104h96" />
      </g>
      <path d="M12 12v26" stroke="var(--k-stroke)" strokeWidth="2" />
      <path d="M17 12v26" stroke="var(--k-ink)" strokeWidth="2" />
      <path d="M12 56v54" stroke="var(--k-line-strong)" strokeWidth="2" />
      <rect
        x="28"
        y="56"
        width="64"
        height="36"
        fill="var(--k-concrete)"
        stroke="var(--k-concrete-edge)"
        strokeWidth="1.5"
      />
      <path
        d="M44 66h32v18H44zM40 66h40M44 62v26M76 62v26"
        fill="none"
        stroke="var(--k-cut)"
        strokeWidth="1.5"
      />
    </svg>
  );
}
