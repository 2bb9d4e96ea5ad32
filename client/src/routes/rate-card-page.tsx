import { useQuery } from '@tanstack/react-query';
import { useTranslation } from 'react-i18next';
import { Page } from '../components/page.tsx';
import { Loading, QueryErrorState } from '../components/states.tsx';
import { rateCardQuery } from '../features/rate-card/api/rate-card.queries.ts';
import { RateCardForm } from '../features/rate-card/components/rate-card-form.tsx';
import { useCan } from '../features/session/hooks/use-session.ts';
import { queryClient } from '../lib/query-client.ts';

export function loader() {
  void queryClient.prefetchQuery(rateCardQuery);
  return null;
}

/** A crew's own prices, costs and production; for its own office alone. */
export default function RateCardPage() {
  const { t } = useTranslation('rate-card');
  const can = useCan();
  const card = useQuery(rateCardQuery);
  return (
    <Page title={t('title')} lead={t('lead')}>
      {card.data !== undefined ? (
        <RateCardForm view={card.data} canEdit={can('bid.write')} />
      ) : card.isError ? (
        <QueryErrorState error={card.error} onRetry={() => void card.refetch()} />
      ) : (
        <Loading />
      )}
    </Page>
  );
}
