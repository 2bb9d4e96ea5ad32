import type { OwnBidView } from '@kerfyard/common/bids';
import type { ScopeDetailView } from '@kerfyard/common/scopes';
import { Button, Heading, Text } from '@radix-ui/themes';
import { useTranslation } from 'react-i18next';
import { ConfirmDialog } from '../../../components/confirm-dialog.tsx';
import { StatusWord } from '../../../components/status-word.tsx';
import { formatDateTime } from '../../../lib/format.ts';
import { useWithdrawBid } from '../api/bids.queries.ts';
import styles from './bids.module.css';
import { Outcome } from './outcome.tsx';
import { PriceSummary } from './price-summary.tsx';

/** The crew's own bid: what it says, where it stands, and the way to change it while bids are open. */
export function OwnBid(props: {
  bid: OwnBidView;
  scope: ScopeDetailView;
  timeZone: string;
  onRevise: (() => void) | null;
}) {
  const { bid, scope, timeZone, onRevise } = props;
  const { t } = useTranslation('bid');
  const isOpen = scope.status === 'open';
  const isRanked = scope.body?.bidding.mode === 'ranked';
  return (
    <section className={styles.panel} aria-labelledby="own-bid">
      <div className={styles.between}>
        <Heading as="h2" size="4" weight="medium" id="own-bid">
          {t('own.title')}
        </Heading>
        <StatusWord tone={bid.status === 'withdrawn' ? 'closed' : 'good'}>
          {t(`own.status.${bid.status}`)}
        </StatusWord>
      </div>
      {bid.rank !== null && (
        <Text size="4" weight="medium">
          {t('own.rank', { rank: bid.rank, of: bid.of })}
        </Text>
      )}
      <PriceSummary priced={bid.priced} />
      <Text size="2" color="gray">
        {t('own.sent', { at: formatDateTime(bid.submittedAt, timeZone), revision: bid.input.revision })}
      </Text>
      {bid.revisionsLeft !== null && isOpen && (
        <Text size="2">{t('own.revisionsLeft', { count: bid.revisionsLeft })}</Text>
      )}
      {bid.outcome !== null && <Outcome outcome={bid.outcome} />}
      {isOpen && onRevise !== null && (
        <div className={styles.row}>
          {!(isRanked && bid.status === 'withdrawn') && (
            <Button size="3" onClick={onRevise}>
              {t(bid.status === 'withdrawn' ? 'own.again' : 'own.revise')}
            </Button>
          )}
          {bid.status !== 'withdrawn' && <Withdraw scopeId={scope.id} isFinal={isRanked} />}
        </div>
      )}
    </section>
  );
}

function Withdraw({ scopeId, isFinal }: { scopeId: string; isFinal: boolean }) {
  const { t } = useTranslation('bid');
  const withdraw = useWithdrawBid(scopeId);
  return (
    <ConfirmDialog
      trigger={
        <Button size="3" variant="soft" color="gray">
          {t('own.withdraw')}
        </Button>
      }
      title={t('own.withdrawTitle')}
      text={t(isFinal ? 'own.withdrawFinal' : 'own.withdrawText')}
      confirm={t('own.withdraw')}
      destructive
      onConfirm={() => withdraw.mutateAsync(undefined)}
    />
  );
}
