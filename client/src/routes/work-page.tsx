import type { SubcontractStatus } from '@kerfyard/common/subcontracts';
import { Heading, Select } from '@radix-ui/themes';
import { useInfiniteQuery } from '@tanstack/react-query';
import { useTranslation } from 'react-i18next';
import { useSearchParams } from 'react-router-dom';
import { CutSketch } from '../components/cut-sketch.tsx';
import { MoreButton } from '../components/more-button.tsx';
import { Page } from '../components/page.tsx';
import { EmptyState, Loading, QueryErrorState } from '../components/states.tsx';
import { useSession } from '../features/session/hooks/use-session.ts';
import { Week } from '../features/visits/components/week.tsx';
import { subcontractsQuery, workKeys } from '../features/work/api/work.queries.ts';
import { SubcontractCard } from '../features/work/components/subcontract-card.tsx';
import styles from '../features/work/components/work.module.css';
import { useLiveHints } from '../lib/live.ts';
import { queryClient } from '../lib/query-client.ts';

const statuses = [
  'awaiting_signatures',
  'active',
  'completed',
  'lapsed',
] as const satisfies readonly SubcontractStatus[];

export function loader() {
  void queryClient.prefetchInfiniteQuery(subcontractsQuery());
  return null;
}

/** What is under contract, and the week's visits. */
export default function WorkPage() {
  const { t } = useTranslation('work');
  useLiveHints({ subcontract: () => [workKeys.lists], money: () => [workKeys.lists] });
  return (
    <Page title={t('title')} lead={t('lead')} width="wide">
      <div className={styles.stack}>
        <Week />
        <Subcontracts />
      </div>
    </Page>
  );
}

function Subcontracts() {
  const { t } = useTranslation('work');
  const [search, setSearch] = useSearchParams();
  const status = statuses.find((one) => one === search.get('status'));
  const list = useInfiniteQuery(subcontractsQuery(status));
  const { company } = useSession();
  const choose = (value: string) =>
    setSearch(
      (current) => {
        if (value === 'all') current.delete('status');
        else current.set('status', value);
        return current;
      },
      { replace: true },
    );
  const items = list.data?.pages.flatMap((page) => page.items) ?? [];
  return (
    <section className={styles.section} aria-labelledby="subcontracts">
      <div className={styles.cardHead}>
        <Heading as="h2" size="5" weight="medium" id="subcontracts">
          {t('list.title')}
        </Heading>
        <Select.Root value={status ?? 'all'} onValueChange={choose} size="3">
          <Select.Trigger aria-label={t('list.filter')} />
          <Select.Content>
            <Select.Item value="all">{t('list.all')}</Select.Item>
            {statuses.map((one) => (
              <Select.Item key={one} value={one}>
                {t(`status.${one}`)}
              </Select.Item>
            ))}
          </Select.Content>
        </Select.Root>
      </div>
      {list.isPending && <Loading />}
      {list.isError && <QueryErrorState error={list.error} onRetry={() => void list.refetch()} />}
      {list.isSuccess && items.length === 0 && (
        <EmptyState
          drawing={
            <CutSketch
              cuts={[
                { kind: 'opening', lengthFt: 4, widthFt: 3, thicknessIn: 8, corners: 'overcut', count: 1 },
              ]}
              look="card"
            />
          }
          title={t('list.empty')}
          text={t('list.emptyText')}
        />
      )}
      <ul className={styles.cards}>
        {items.map((item) => (
          <li key={item.id}>
            <SubcontractCard
              item={item}
              otherSide={company?.id === item.gc.id ? item.crew.name : item.gc.name}
            />
          </li>
        ))}
      </ul>
      <div>
        <MoreButton list={list}>{t('list.more')}</MoreButton>
      </div>
    </section>
  );
}
