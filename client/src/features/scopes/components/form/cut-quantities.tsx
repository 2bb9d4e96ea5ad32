import { sumTakeoffs, type CutLine } from '@kerfyard/common/scopes';
import type { CutTakeoff } from '@kerfyard/common/cutting';
import { Text } from '@radix-ui/themes';
import { memo, useMemo } from 'react';
import { useTranslation } from 'react-i18next';
import { CutSketch } from '../../../../components/cut-sketch.tsx';
import { readCut, type DraftCut } from '../../cut-lines.ts';
import { ScopeTotals } from '../scope-totals.tsx';
import styles from './cut-list.module.css';

/** A sketch shows no more; the rest need not be drawn anew with each key. */
const DRAWN = 60;

/** The cut list drawn to scale and its sums, as far as its lines are whole; follows the typing. */
export const CutQuantities = memo(function CutQuantities({ lines }: { lines: readonly DraftCut[] }) {
  const { t } = useTranslation('scopes');
  const { whole, takeoffs } = useMemo(() => wholeOf(lines), [lines]);
  const totals = useMemo(() => sumTakeoffs(takeoffs), [takeoffs]);
  const drawn = useMemo(() => whole.slice(0, DRAWN).map((line) => line.cut), [whole]);
  const missing = lines.length - whole.length;
  return (
    <div className={styles.quantitiesBox}>
      <CutSketch
        cuts={drawn}
        cutCount={whole.length}
        empty={
          <Text size="2" color="gray">
            {t('cuts.sketchEmpty')}
          </Text>
        }
      />
      {whole.length > 0 && <ScopeTotals totals={totals} cuts={whole} takeoffs={takeoffs} />}
      {missing > 0 && (
        <Text as="p" size="2" color="gray">
          {t('cuts.notWhole', { count: missing })}
        </Text>
      )}
    </div>
  );
});

/** The lines that are whole, each taken off once for as long as it does not change. */
function wholeOf(lines: readonly DraftCut[]): { whole: CutLine[]; takeoffs: CutTakeoff[] } {
  const whole: CutLine[] = [];
  const takeoffs: CutTakeoff[] = [];
  for (const line of lines) {
    const reading = readCut(line);
    if (reading.state !== 'whole') continue;
    whole.push(reading.line);
    takeoffs.push(reading.takeoff);
  }
  return { whole, takeoffs };
}
