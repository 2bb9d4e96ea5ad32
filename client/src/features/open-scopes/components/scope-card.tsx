import type { ScopeCardView } from '@kerfyard/common/scopes';
import { Heading, Text } from '@radix-ui/themes';
import { useTranslation } from 'react-i18next';
import { DueTime } from '../../../components/countdown.tsx';
import { CutSketch } from '../../../components/cut-sketch.tsx';
import { Figure } from '../../../components/figure.tsx';
import { TextLink } from '../../../components/link.tsx';
import { StatusWord } from '../../../components/status-word.tsx';
import { formatNumber } from '../../../lib/format.ts';
import { paths } from '../../../lib/paths.ts';
import styles from './open-scopes.module.css';

/** A scope on the list of open scopes: a crew knows the job before reading a word. */
export function ScopeCard({ scope }: { scope: ScopeCardView }) {
  const { t } = useTranslation('open-scopes');
  const { totals } = scope;
  return (
    <article className={styles.card}>
      <CutSketch cuts={scope.cuts.map((line) => line.cut)} cutCount={scope.cutCount} look="card" />
      <Heading as="h2" size="4" weight="medium">
        <TextLink to={paths.openScope(scope.id)} color="gray" highContrast>
          {scope.title}
        </TextLink>
      </Heading>
      <div className={styles.row}>
        <Text size="2">
          {scope.distanceMi === null
            ? t('card.place', { city: scope.city, state: scope.state })
            : t('card.placeAway', {
                city: scope.city,
                state: scope.state,
                miles: formatNumber(scope.distanceMi, 0),
              })}
        </Text>
        <Text size="2" color="gray">
          {scope.number}
        </Text>
      </div>
      <dl className={styles.figures}>
        {totals.inchFeet > 0 && (
          <div>
            <dt>{t('card.sawing')}</dt>
            <dd>
              <Figure label={t('card.sawing')} value={totals.inchFeet} unit="in-ft" digits={0} />
            </dd>
          </div>
        )}
        {totals.coreHoles > 0 && (
          <div>
            <dt>{t('card.cores')}</dt>
            <dd>
              <Figure label={t('card.cores')} value={totals.coreHoles} unit="" digits={0} />
            </dd>
          </div>
        )}
      </dl>
      <Text size="2" color="gray">
        {scope.methods.map((method) => t(`methods.${method}`)).join(' · ')}
      </Text>
      <div className={styles.row}>
        <DueTime at={scope.dueAt} timeZone={scope.timeZone} />
        <Text size="2">{t(`mode.${scope.mode}`)}</Text>
      </div>
      <div className={styles.row}>
        <Text size="2" color="gray">
          {t('card.gc', { name: scope.gc.name, awarded: scope.gcRecord.awarded, due: scope.gcRecord.due })}
        </Text>
        <OwnBidWord ownBid={scope.ownBid} />
      </div>
    </article>
  );
}

function OwnBidWord({ ownBid }: { ownBid: ScopeCardView['ownBid'] }) {
  const { t } = useTranslation('open-scopes');
  if (ownBid === null) return null;
  if (ownBid.status === 'draft') return <StatusWord tone="quiet">{t('own.draft')}</StatusWord>;
  if (ownBid.status === 'withdrawn') return <StatusWord tone="closed">{t('own.withdrawn')}</StatusWord>;
  if (ownBid.rank === null) return <StatusWord tone="good">{t('own.in')}</StatusWord>;
  return <StatusWord tone="good">{t('own.rank', { rank: ownBid.rank, of: ownBid.of })}</StatusWord>;
}
