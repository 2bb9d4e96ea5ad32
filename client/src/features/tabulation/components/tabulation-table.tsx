import type { BidTabulationView } from '@kerfyard/common/bids';
import type { WorkingStep } from '@kerfyard/common/cutting';
import { Heading, Text } from '@radix-ui/themes';
import type { ReactNode } from 'react';
import { useTranslation } from 'react-i18next';
import { Figure } from '../../../components/figure.tsx';
import { MoneyText } from '../../../components/money-text.tsx';
import { StatusWord, type StatusTone } from '../../../components/status-word.tsx';
import { formatDate, formatMoney, formatNumber } from '../../../lib/format.ts';
import type { ComparedBid } from '../compare.ts';
import { PlugInput } from './plug-input.tsx';
import styles from './tabulation.module.css';

interface TabulationTableProps {
  view: BidTabulationView;
  bids: readonly ComparedBid[];
  /** Plugs may be set: the scope has not ended and the person may write. */
  canPlug: boolean;
  onPlug: (item: string, cents: number) => Promise<unknown>;
  /** The button under a bid. */
  award: (compared: ComparedBid) => ReactNode;
}

/** The same rows for all bids; what one leaves out is added back at the general contractor's own price. */
export function TabulationTable({ view, bids, canPlug, onPlug, award }: TabulationTableProps) {
  const { t } = useTranslation(['tabulation', 'scope']);
  return (
    <section className={styles.section} aria-labelledby="tabulation">
      <div>
        <Heading as="h2" size="5" weight="medium" id="tabulation">
          {t('table.title')}
        </Heading>
        <Text as="p" size="2" color="gray">
          {t(view.rows.length === 0 ? 'table.noItems' : 'table.plugHint')}
        </Text>
      </div>
      {/* A wide table scrolls by itself; keyboards reach it because it takes the focus. */}
      <div className={styles.scroll} tabIndex={0} role="group" aria-labelledby="tabulation">
        <table className={styles.table}>
          <Head view={view} bids={bids} />
          <tbody>
            <SumRow
              label={t('table.base')}
              bids={bids}
              cell={({ row }) => <MoneyText cents={row.baseCents} />}
            />
            <ItemRows view={view} bids={bids} canPlug={canPlug} onPlug={onPlug} />
            <SumRow
              label={t('table.leftOut')}
              bids={bids}
              cell={({ row }) => <MoneyText cents={row.plugsCents} signed />}
            />
            <SumRow
              label={t('table.adjusted')}
              isTotal
              bids={bids}
              cell={(compared) => <Adjusted compared={compared} view={view} />}
            />
            <FactRows bids={bids} />
            <tr className={styles.awards}>
              <td />
              <td />
              {bids.map((compared) => (
                <td key={compared.bid.id} className={styles.right}>
                  {award(compared)}
                </td>
              ))}
            </tr>
          </tbody>
        </table>
      </div>
    </section>
  );
}

function Head({ view, bids }: Pick<TabulationTableProps, 'view' | 'bids'>) {
  const { t } = useTranslation('tabulation');
  return (
    <thead>
      <tr>
        <th scope="col">{t('table.item')}</th>
        <th scope="col" className={styles.right}>
          {t('table.plug')}
        </th>
        {bids.map(({ bid }) => (
          <th key={bid.id} scope="col" className={styles.crew}>
            <a href={`#bid-${bid.id}`}>{bid.crew.name}</a>
            {view.awardedBidId === bid.id && <StatusWord tone="done">{t('award.awarded')}</StatusWord>}
          </th>
        ))}
      </tr>
    </thead>
  );
}

/** One row for each item the scope gives to the crew. */
function ItemRows({ view, bids, canPlug, onPlug }: Omit<TabulationTableProps, 'award'>) {
  const { t } = useTranslation(['tabulation', 'scope']);
  return (
    <>
      {view.rows.map(({ item, plugCents }) => (
        <tr key={item}>
          <th scope="row">{t(`scope:items.${item}`)}</th>
          <td className={styles.right}>
            <PlugInput
              label={t('table.plugFor', { item: t(`scope:items.${item}`) })}
              cents={plugCents}
              disabled={!canPlug}
              onSave={(cents) => onPlug(item, cents)}
            />
          </td>
          {bids.map(({ bid, row }) => (
            <td key={bid.id} className={styles.right}>
              <Answer answer={row.answers[item] ?? 'unclear'} plugCents={plugCents} />
            </td>
          ))}
        </tr>
      ))}
    </>
  );
}

/** What is worth knowing beside the price. */
function FactRows({ bids }: Pick<TabulationTableProps, 'bids'>) {
  const { t } = useTranslation('tabulation');
  return (
    <>
      <SumRow label={t('table.notSaid')} bids={bids} cell={({ row }) => formatNumber(row.unclear, 0)} />
      <SumRow
        label={t('table.distance')}
        bids={bids}
        cell={({ bid }) =>
          bid.distanceMi === null ? '' : t('table.miles', { miles: formatNumber(bid.distanceMi, 0) })
        }
      />
      <SumRow
        label={t('table.valid')}
        bids={bids}
        cell={({ bid }) => t('table.days', { count: bid.input.validDays })}
      />
      <SumRow
        label={t('table.start')}
        bids={bids}
        cell={({ bid }) => (bid.input.startFrom === null ? t('table.any') : formatDate(bid.input.startFrom))}
      />
    </>
  );
}

function SumRow(props: {
  label: string;
  bids: readonly ComparedBid[];
  cell: (compared: ComparedBid) => ReactNode;
  isTotal?: boolean;
}) {
  return (
    <tr className={props.isTotal === true ? styles.total : undefined}>
      <th scope="row">{props.label}</th>
      <td />
      {props.bids.map((compared) => (
        <td key={compared.bid.id} className={styles.right}>
          {props.cell(compared)}
        </td>
      ))}
    </tr>
  );
}

const tones: Record<'included' | 'excluded' | 'unclear', StatusTone> = {
  included: 'good',
  excluded: 'bad',
  unclear: 'warn',
};

function Answer({ answer, plugCents }: { answer: keyof typeof tones; plugCents: number }) {
  const { t } = useTranslation('tabulation');
  return (
    <span className={styles.answer}>
      <StatusWord tone={tones[answer]}>{t(`answers.${answer}`)}</StatusWord>
      {answer === 'excluded' && plugCents > 0 && <MoneyText cents={plugCents} weight="quiet" signed />}
    </span>
  );
}

/** The adjusted price, open to what was added; computed by the server. */
function Adjusted({ compared, view }: { compared: ComparedBid; view: BidTabulationView }) {
  const { t } = useTranslation(['tabulation', 'scope']);
  const { row } = compared;
  const added = view.rows.filter(({ item }) => row.answers[item] === 'excluded');
  const working: WorkingStep[] = [
    {
      label: t('adjustedWorking.label'),
      formula: t('adjustedWorking.formula'),
      inputs: [
        { name: t('adjustedWorking.base'), value: row.baseCents, unit: 'cents' },
        ...added.map(({ item, plugCents }) => ({
          name: t(`scope:items.${item}`),
          value: plugCents,
          unit: 'cents',
        })),
      ],
      value: row.adjustedCents,
      unit: 'cents',
      source: { origin: 'arithmetic' },
    },
  ];
  return (
    <Figure
      label={`${compared.bid.crew.name}, ${t('table.adjusted')}`}
      value={formatMoney(row.adjustedCents)}
      unit=""
      working={working}
    />
  );
}
