import type { BidOutcome } from '@kerfyard/common/bids';
import { Text } from '@radix-ui/themes';
import { useTranslation } from 'react-i18next';
import { StatusWord } from '../../../components/status-word.tsx';

/** How a bid came out: won, or rank, band and reason; never another's price. */
export function Outcome({ outcome }: { outcome: BidOutcome }) {
  const { t } = useTranslation('bid');
  if (outcome.won) return <StatusWord tone="done">{t('outcome.won')}</StatusWord>;
  return (
    <div>
      <StatusWord tone="closed">{t('outcome.lost')}</StatusWord>
      {outcome.rank !== null && outcome.band !== null && (
        <Text as="p" size="2">
          {t('outcome.rank', { rank: outcome.rank, of: outcome.of })} {t(`outcome.bands.${outcome.band}`)}
        </Text>
      )}
      {outcome.reason !== null && (
        <Text as="p" size="2">
          {t('outcome.reason', { reason: t(`outcome.reasons.${outcome.reason}`) })} {outcome.note}
        </Text>
      )}
    </div>
  );
}
