import type { BidUnit, OpenedBidView } from '@kerfyard/common/bids';
import { describeCut } from '@kerfyard/common/cutting';
import type { CutLine } from '@kerfyard/common/scopes';
import { Text } from '@radix-ui/themes';
import { useTranslation } from 'react-i18next';
import { DataTable } from '../../../components/data-table.tsx';
import { MoneyText } from '../../../components/money-text.tsx';
import { formatDateTime, formatMoney, formatNumber, formatRate } from '../../../lib/format.ts';
import styles from './tabulation.module.css';

interface OpenedBidProps {
  bid: OpenedBidView;
  cuts: readonly CutLine[];
  timeZone: string;
}

/** One bid whole: its lines, what it includes and excludes beyond the sheet, its note. */
export function OpenedBid({ bid, cuts, timeZone }: OpenedBidProps) {
  const { t } = useTranslation('tabulation');
  const { input, priced } = bid;
  return (
    <details className={styles.bid} id={`bid-${bid.id}`}>
      <summary>{t('bid.summary', { crew: bid.crew.name, price: formatMoney(priced.totalCents) })}</summary>
      <div className={styles.bidBody}>
        <Text as="p" size="2" color="gray">
          {t('bid.handedIn', { at: formatDateTime(bid.submittedAt, timeZone) })}
        </Text>
        {priced.lines.length === 0 ? (
          <Text as="p">{t('bid.lump')}</Text>
        ) : (
          <PricedLines bid={bid} cuts={cuts} />
        )}
        <PriceFacts priced={priced} />
        {priced.minimumApplied && (
          <Text as="p" size="2">
            {t('price.minimumApplied')}
          </Text>
        )}
        <dl className={styles.facts}>
          <dt>{t('bid.inclusions')}</dt>
          <dd>
            <Items items={input.inclusions} />
          </dd>
          <dt>{t('bid.exclusions')}</dt>
          <dd>
            <Items items={input.exclusions} />
          </dd>
          {input.note !== '' && (
            <>
              <dt>{t('bid.note')}</dt>
              <dd className={styles.note}>{input.note}</dd>
            </>
          )}
        </dl>
      </div>
    </details>
  );
}

function Items({ items }: { items: readonly string[] }) {
  const { t } = useTranslation('tabulation');
  if (items.length === 0) return <>{t('bid.nothing')}</>;
  return (
    <ul className={styles.items}>
      {items.map((item) => (
        <li key={item}>{item}</li>
      ))}
    </ul>
  );
}

function PricedLines({ bid, cuts }: { bid: OpenedBidView; cuts: readonly CutLine[] }) {
  const { t } = useTranslation(['tabulation', 'bid']);
  const cutOf = new Map(cuts.map((line) => [line.id, line]));
  return (
    <DataTable
      caption={t('bid.lines')}
      csvName={`bid-${bid.crew.name}`}
      rows={bid.priced.lines}
      rowKey={(line) => `${line.cutId} ${line.unit}`}
      columns={[
        {
          key: 'mark',
          head: t('bid.mark'),
          cell: (line) => cutOf.get(line.cutId)?.mark ?? '',
          csv: (line) => cutOf.get(line.cutId)?.mark ?? '',
        },
        {
          key: 'cut',
          head: t('bid.cut'),
          cell: (line) => {
            const cut = cutOf.get(line.cutId)?.cut;
            return cut === undefined ? '' : describeCut(cut);
          },
        },
        {
          key: 'quantity',
          head: t('bid.quantity'),
          align: 'right',
          cell: (line) => `${formatNumber(line.quantity / 100, 2)} ${unitWords(line.unit, t)}`.trim(),
          csv: (line) => line.quantity / 100,
        },
        {
          key: 'rate',
          head: t('bid.rate'),
          align: 'right',
          cell: (line) => `${formatRate(line.rate / 100)}${factorWords(line.factors, t)}`,
          csv: (line) => line.rate / 10_000,
        },
        {
          key: 'amount',
          head: t('bid.amount'),
          align: 'right',
          cell: (line) => <MoneyText cents={line.cents} />,
          csv: (line) => line.cents / 100,
        },
      ]}
    />
  );
}

/** Pieces and lump sums are counted, not measured. */
function unitWords(unit: BidUnit, t: (key: string) => string): string {
  return unit === 'each' || unit === 'lump' ? '' : t(`bid:units.${unit}`);
}

/** What a price by lines comes to: the sum, mobilization, the minimum of the trip, the price. */
function PriceFacts({ priced }: { priced: OpenedBidView['priced'] }) {
  const { t } = useTranslation('tabulation');
  const rows = (['computed', 'mobilization', 'minimum', 'total'] as const)
    .map((name) => ({ name, cents: priced[`${name}Cents`] }))
    .filter(({ name, cents }) => name === 'total' || (cents > 0 && priced.lines.length > 0));
  return (
    <dl className={styles.price}>
      {rows.map(({ name, cents }) => (
        <div key={name} className={name === 'total' ? styles.priceTotal : undefined}>
          <dt>{t(`price.${name}`)}</dt>
          <dd>
            <MoneyText cents={cents} weight={name === 'total' ? 'strong' : 'normal'} />
          </dd>
        </div>
      ))}
    </dl>
  );
}

function factorWords(
  factors: readonly number[],
  t: (key: 'bid.factors', values: { factors: string }) => string,
): string {
  if (factors.length === 0) return '';
  return ` ${t('bid.factors', { factors: factors.map((factor) => factor / 100).join(' × ') })}`;
}
