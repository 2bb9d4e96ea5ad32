import type { PricedBid } from '@kerfyard/common/bids';
import type { JobEstimate, Spread } from '@kerfyard/common/estimates';
import type { WorkingStep } from '@kerfyard/common/cutting';
import type { Responsibility, ResponsibilityItem } from '@kerfyard/common/scopes';
import { useTranslation } from 'react-i18next';
import { formatMoney, formatNumber, formatPercent } from '../../../lib/format.ts';
import { EstimateRow } from './estimate-row.tsx';
import styles from './estimate.module.css';

interface EstimateFiguresProps {
  estimate: JobEstimate;
  responsibilities: readonly Responsibility[];
  priced: PricedBid | null;
}

/** Hours and what they need, then what it costs the crew against what it would bring. */
export function EstimateFigures(props: EstimateFiguresProps) {
  return (
    <>
      <TimeFigures {...props} />
      <SiteFigures {...props} />
      <MoneyFigures {...props} />
    </>
  );
}

/** Two figures as one text: "3 to 5", or one where they are equal once rounded. */
function useSpread() {
  const { t } = useTranslation('estimate');
  return ({ low, high }: Pick<Spread, 'low' | 'high'>, show: (value: number) => string) =>
    show(low) === show(high) ? show(low) : t('span', { low: show(low), high: show(high) });
}

const oneDigit = (value: number) => formatNumber(value, 1);
const whole = (value: number) => formatNumber(value, 0);
const dollars = (cents: number) => formatMoney(cents);

function TimeFigures({ estimate }: EstimateFiguresProps) {
  const { t } = useTranslation('estimate');
  const spread = useSpread();
  return (
    <dl className={styles.figures} aria-label={t('time')}>
      {estimate.tools.map((tool) => (
        <EstimateRow
          key={`${tool.tool} ${tool.unit} ${tool.quantity}`}
          label={t(`tools.${tool.tool}`, { quantity: oneDigit(tool.quantity), unit: tool.unit })}
          value={spread(tool, oneDigit)}
          unit="h"
          working={tool.working}
        />
      ))}
      <EstimateRow
        label={t('hours')}
        value={spread(estimate.hours, oneDigit)}
        unit="h"
        working={estimate.hours.working}
        isTotal
      />
    </dl>
  );
}

function SiteFigures({ estimate, responsibilities }: EstimateFiguresProps) {
  const { t } = useTranslation(['estimate', 'scope']);
  const spread = useSpread();
  const { waterGal, drums, slurryLb, spoil, batteryPacks, generatorKw } = estimate;
  const holder = (item: ResponsibilityItem) => {
    const row = responsibilities.find((one) => one.item === item);
    return row === undefined ? undefined : t(`with.${row.by}`, { name: row.name });
  };
  return (
    <dl className={styles.figures} aria-label={t('site')}>
      {waterGal.high > 0 && (
        <>
          <EstimateRow
            label={t('water')}
            value={spread(waterGal, whole)}
            unit="gal"
            working={waterGal.working}
            note={holder('water')}
          />
          <EstimateRow
            label={t('drums')}
            value={spread(drums, whole)}
            working={drums.working}
            note={holder('slurry')}
          />
          <EstimateRow
            label={t('slurryWeight')}
            value={spread(slurryLb, whole)}
            unit="lb"
            working={slurryLb.working}
          />
        </>
      )}
      {spoil !== null && (
        <>
          <EstimateRow
            label={t('spoil')}
            value={oneDigit(spoil.tons.value)}
            unit="tons"
            working={spoil.tons.working}
          />
          <EstimateRow
            label={t('loads')}
            value={whole(spoil.loads.value)}
            working={spoil.loads.working}
            note={holder('haul')}
          />
        </>
      )}
      {batteryPacks !== null && (
        <EstimateRow
          label={t('packs')}
          value={whole(batteryPacks.value)}
          working={batteryPacks.working}
          note={holder('power')}
        />
      )}
      {generatorKw !== null && (
        <EstimateRow
          label={t('generator')}
          value={oneDigit(generatorKw.value)}
          unit="kW"
          working={generatorKw.working}
          note={holder('power')}
        />
      )}
    </dl>
  );
}

function MoneyFigures({ estimate, priced }: EstimateFiguresProps) {
  const { t } = useTranslation('estimate');
  const spread = useSpread();
  const { crewCents, bladeCents, bitCents, costCents } = estimate;
  return (
    <dl className={styles.figures} aria-label={t('money')}>
      {crewCents !== null && (
        <EstimateRow label={t('crew')} value={spread(crewCents, dollars)} working={crewCents.working} />
      )}
      {bladeCents !== null && (
        <EstimateRow label={t('blades')} value={dollars(bladeCents.value)} working={bladeCents.working} />
      )}
      {bitCents !== null && (
        <EstimateRow label={t('bits')} value={dollars(bitCents.value)} working={bitCents.working} />
      )}
      {costCents !== null && (
        <EstimateRow
          label={t('cost')}
          value={spread(costCents, dollars)}
          working={costCents.working}
          isTotal
        />
      )}
      {priced !== null && <PriceRows priced={priced} />}
      {priced !== null && costCents !== null && <LeftOver priced={priced} costCents={costCents} />}
    </dl>
  );
}

function PriceRows({ priced }: { priced: PricedBid }) {
  const { t } = useTranslation('estimate');
  const { computedCents, minimumCents, mobilizationCents, totalCents } = priced;
  const working: WorkingStep = {
    label: t('price'),
    formula: 'max(minimum, sum of the lines) + mobilization on top',
    inputs: [
      { name: t('minimum'), value: minimumCents, unit: 'cents' },
      { name: t('sum'), value: computedCents, unit: 'cents' },
      { name: t('mobilization'), value: mobilizationCents, unit: 'cents' },
    ],
    value: totalCents,
    unit: 'cents',
    source: { origin: 'company' },
  };
  const note =
    minimumCents === 0
      ? undefined
      : t(priced.minimumApplied ? 'minimumAbove' : 'minimumBelow', {
          minimum: dollars(minimumCents),
          sum: dollars(computedCents),
        });
  return <EstimateRow label={t('price')} value={dollars(totalCents)} working={[working]} note={note} />;
}

function LeftOver({ priced, costCents }: { priced: PricedBid; costCents: Spread }) {
  const { t } = useTranslation('estimate');
  const spread = useSpread();
  const { totalCents } = priced;
  const left = { low: totalCents - costCents.high, high: totalCents - costCents.low };
  const leftStep = (label: string, cost: number): WorkingStep => ({
    label,
    formula: 'price − cost',
    inputs: [
      { name: t('price'), value: totalCents, unit: 'cents' },
      { name: t('cost'), value: cost, unit: 'cents' },
    ],
    value: totalCents - cost,
    unit: 'cents',
    source: { origin: 'arithmetic' },
  });
  const working =
    left.low === left.high
      ? [leftStep(t('left'), costCents.low)]
      : [leftStep(t('leftWorst'), costCents.high), leftStep(t('leftBest'), costCents.low)];
  const percent = spread({ low: left.low / totalCents, high: left.high / totalCents }, (ratio) =>
    formatPercent(ratio),
  );
  return (
    <EstimateRow
      label={t('left')}
      value={spread(left, dollars)}
      working={working}
      note={t('ofPrice', { percent })}
      isTotal
    />
  );
}
