import { bidUnitsOfKind, cutQuantity } from '@kerfyard/common/bids';
import { describeCut, takeoffCut } from '@kerfyard/common/cutting';
import type { BidInput } from '@kerfyard/common/bids';
import type { CutLine } from '@kerfyard/common/scopes';
import { Text } from '@radix-ui/themes';
import { useMemo } from 'react';
import { useWatch, type Control } from 'react-hook-form';
import { useTranslation } from 'react-i18next';
import { SelectField } from '../../../components/form/fields.tsx';
import { MoneyField } from '../../../components/form/number-fields.tsx';
import { Figure } from '../../../components/figure.tsx';
import type { BidFormValues } from '../bid-form-values.ts';
import styles from './bids.module.css';

type BidControl = Control<BidFormValues, unknown, BidInput>;

/** One cut's price: what the rate is per, the rate, and the quantity it will be multiplied by. */
export function LineFields({ line, index, control }: { line: CutLine; index: number; control: BidControl }) {
  const { t } = useTranslation('bid');
  const unit = useWatch({ control, name: `lines.${index}.unit` });
  const takeoff = useMemo(() => takeoffCut(line.cut), [line.cut]);
  const quantity = cutQuantity(line, takeoff, unit) / 100;
  return (
    <div className={styles.line}>
      <div className={`${styles.between} ${styles.lineHead}`}>
        <Text size="2">
          <strong>{line.mark}</strong> {describeCut(line.cut)}
        </Text>
        <Figure
          label={t('line.quantity')}
          value={quantity}
          unit={unit === 'each' || unit === 'lump' ? '' : t(`units.${unit}`)}
          working={takeoff.working}
        />
      </div>
      <SelectField
        control={control}
        name={`lines.${index}.unit`}
        label={t('line.per')}
        options={bidUnitsOfKind[line.cut.kind].map((value) => ({ value, label: t(`per.${value}`) }))}
      />
      <MoneyField
        control={control}
        name={`lines.${index}.rateCents`}
        label={t('line.rate', { mark: line.mark })}
      />
    </div>
  );
}
