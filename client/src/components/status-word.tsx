import styles from './status-word.module.css';

/**
 * What a status means to the reader, beyond its word. Each has a shape of its own, so that colour is never alone:
 * `quiet` hollow circle · `open` full circle · `waiting` half circle · `good` square with a tick · `done` full square ·
 * `warn` triangle · `bad` cross · `closed` dash.
 */
export type StatusTone = 'quiet' | 'open' | 'waiting' | 'good' | 'done' | 'warn' | 'bad' | 'closed';

const shapes: Record<StatusTone, React.ReactNode> = {
  quiet: <circle cx="6" cy="6" r="4.2" className={styles.hollow} />,
  open: <circle cx="6" cy="6" r="5" className={styles.full} />,
  waiting: (
    <>
      <circle cx="6" cy="6" r="4.2" className={styles.hollow} />
      <path d="M6 1.8a4.2 4.2 0 0 1 0 8.4z" className={styles.full} />
    </>
  ),
  good: (
    <>
      <rect x="1" y="1" width="10" height="10" className={styles.hollow} />
      <path d="M3.4 6.2 5.3 8l3.4-4" className={styles.hollow} />
    </>
  ),
  done: <rect x="1" y="1" width="10" height="10" className={styles.full} />,
  warn: <path d="M6 .8 11.6 11H.4z" className={styles.full} />,
  bad: <path d="m2 2 8 8M10 2l-8 8" className={styles.hollow} />,
  closed: <path d="M1.5 6h9" className={styles.hollow} />,
};

/** A status: a shape and a word first, a colour last. */
export function StatusWord({ tone, children }: { tone: StatusTone; children: string }) {
  return (
    <span className={`${styles.status} ${styles[tone]}`}>
      <svg width="12" height="12" viewBox="0 0 12 12" aria-hidden="true" focusable="false">
        {shapes[tone]}
      </svg>
      {children}
    </span>
  );
}
