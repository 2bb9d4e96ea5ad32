import { readCutList } from '@kerfyard/common/scopes';
import { Text } from '@radix-ui/themes';
import { memo, useMemo } from 'react';
import { useTranslation } from 'react-i18next';
import { CutSketch } from '../../../../components/cut-sketch.tsx';
import { readCut, type DraftCut } from '../../cut-lines.ts';
import { ScopeTotals } from '../scope-totals.tsx';
import styles from './cut-list.module.css';

/** The cut list drawn to scale and its sums, as far as its lines are whole; follows the typing. */
export const CutQuantities = memo(function CutQuantities({ lines }: { lines: readonly DraftCut[] }) {
  const { t } = useTranslation('scopes');
  const whole = useMemo(
    () =>
      lines.flatMap((line) => {
        const reading = readCut(line);
        return reading.state === 'whole' ? [reading.line] : [];
      }),
    [lines],
  );
  const cuts = useMemo(() => whole.map((line) => line.cut), [whole]);
  const reading = useMemo(() => readCutList(whole), [whole]);
  const missing = lines.length - whole.length;
  return (
    <div className={styles.quantitiesBox}>
      <CutSketch
        cuts={cuts}
        empty={
          <Text size="2" color="gray">
            {t('cuts.sketchEmpty')}
          </Text>
        }
      />
      {reading.ok && whole.length > 0 && <ScopeTotals totals={reading.totals} cuts={whole} />}
      {missing > 0 && (
        <Text as="p" size="2" color="gray">
          {t('cuts.notWhole', { count: missing })}
        </Text>
      )}
    </div>
  );
});
