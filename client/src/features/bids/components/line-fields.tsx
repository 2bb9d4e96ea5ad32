import { bidUnitsOfKind, cutQuantity, methodsOfCutHere, type BidInput } from '@kerfyard/common/bids';
import { describeCut, takeoffCut } from '@kerfyard/common/cutting';
import type { Method } from '@kerfyard/common/people';
import type { Conditions, CutLine } from '@kerfyard/common/scopes';
import { Text } from '@radix-ui/themes';
import { useMemo } from 'react';
import { useWatch, type Control } from 'react-hook-form';
import { useTranslation } from 'react-i18next';
import { SelectField } from '../../../components/form/fields.tsx';
import { RateField } from '../../../components/form/number-fields.tsx';
import { Figure } from '../../../components/figure.tsx';
import { formatNumber, formatRate } from '../../../lib/format.ts';
import type { BidFormValues } from '../bid-form-values.ts';
import styles from './bids.module.css';

type BidControl = Control<BidFormValues, unknown, BidInput>;

interface LineFieldsProps {
  line: CutLine;
  index: number;
  control: BidControl;
  conditions: Conditions;
  /** What the crew's company offers. */
  offered: readonly Method[];
}

/** One cut's price: what the rate is per, the rate, how it is done, and the quantity the rate is multiplied by. */
export function LineFields({ line, index, control, conditions, offered }: LineFieldsProps) {
  const { t } = useTranslation(['bid', 'rate-card']);
  const unit = useWatch({ control, name: `lines.${index}.unit` });
  const takeoff = useMemo(() => takeoffCut(line.cut), [line.cut]);
  const quantity = cutQuantity(line, takeoff, unit) / 100;
  const hint = useRateHint(control, index);
  const methodWord = (method: Method) => t(`rate-card:methods.${method}`);
  const able = useMemo(
    () => methodsOfCutHere(line.cut, conditions, offered),
    [line.cut, conditions, offered],
  );
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
      <RateField
        control={control}
        name={`lines.${index}.rate`}
        label={t('line.rate', { mark: line.mark })}
        hint={hint}
      />
      <SelectField
        control={control}
        name={`lines.${index}.method`}
        label={t('line.method')}
        placeholder={
          able[0] === undefined ? t('line.noMethod') : t('line.usual', { method: methodWord(able[0]) })
        }
        options={able.map((value) => ({ value, label: methodWord(value) }))}
      />
    </div>
  );
}

/** Whose number the rate is: the card's, or the crew's own in its place, or what factors it kept. */
function useRateHint(control: BidControl, index: number): string | undefined {
  const { t } = useTranslation(['bid', 'rate-card']);
  const { card, rate, unit, keptFactors } = useWatch({ control, name: `lines.${index}` });
  if (keptFactors.length > 0) {
    return t('line.kept', { factors: keptFactors.map((one) => formatNumber(one / 100, 2)).join(' × ') });
  }
  if (card === null) return undefined;
  const method = t(`rate-card:methods.${card.method}`);
  const band =
    card.upToIn === null ? t('line.anySize') : t('line.upTo', { size: formatNumber(card.upToIn, 3) });
  return card.rate === rate && card.unit === unit
    ? t('line.fromCard', { method, band })
    : t('line.changed', { rate: formatRate(card.rate / 100), unit: t(`per.${card.unit}`), method, band });
}
