import type { SubcontractListItem } from '@kerfyard/common/subcontracts';
import { Heading, Text } from '@radix-ui/themes';
import { useTranslation } from 'react-i18next';
import { CutSketch } from '../../../components/cut-sketch.tsx';
import { TextLink } from '../../../components/link.tsx';
import { MoneyLine } from '../../../components/money-line.tsx';
import { formatDateTime, formatMoney } from '../../../lib/format.ts';
import { paths } from '../../../lib/paths.ts';
import { SubcontractStatusWord } from './subcontract-status.tsx';
import styles from './work.module.css';

/** A subcontract on a list: its cuts as its face, then who, where, money and the next visit. */
export function SubcontractCard({ item, otherSide }: { item: SubcontractListItem; otherSide: string }) {
  const { t } = useTranslation('work');
  return (
    <article className={styles.card}>
      <CutSketch cuts={item.cuts.map((line) => line.cut)} look="card" />
      <div className={styles.cardHead}>
        <SubcontractStatusWord status={item.status} />
        <Text size="2" color="gray">
          {item.number}
        </Text>
      </div>
      <Heading as="h2" size="4" weight="medium">
        <TextLink to={paths.workItem(item.id)} color="gray" highContrast>
          {item.title}
        </TextLink>
      </Heading>
      <Text size="2" color="gray">
        {t('card.withIn', { name: otherSide, city: item.city, state: item.state })}
      </Text>
      <MoneyLine money={item.money} look="bar" />
      <div className={styles.cardHead}>
        <Text size="3" weight="medium">
          {formatMoney(item.money.contractCents)}
        </Text>
        <Text size="2">
          {item.nextVisitAt === null
            ? t('card.noVisit')
            : t('card.nextVisit', { at: formatDateTime(item.nextVisitAt, item.timeZone) })}
        </Text>
      </div>
    </article>
  );
}
