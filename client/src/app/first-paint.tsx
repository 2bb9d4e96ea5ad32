import { Mark } from '../components/mark.tsx';
import styles from './first-paint.module.css';

/** Stands for the instant before the first page's code is here: the mark, still. */
export function FirstPaint() {
  return (
    <div className={styles.stage} aria-hidden="true">
      <Mark size={40} />
    </div>
  );
}
