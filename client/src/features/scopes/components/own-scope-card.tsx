import type { OwnScopeView } from '@kerfyard/common/scopes';
import { Heading, Text } from '@radix-ui/themes';
import { useTranslation } from 'react-i18next';
import { DueTime } from '../../../components/countdown.tsx';
import { CutSketch } from '../../../components/cut-sketch.tsx';
import { Figure } from '../../../components/figure.tsx';
import { TextLink } from '../../../components/link.tsx';
import { deviceTimeZone } from '../../../lib/clock.ts';
import { formatDateTime } from '../../../lib/format.ts';
import { paths } from '../../../lib/paths.ts';
import styles from './own-scopes.module.css';
import { ScopeStatusWord } from './scope-status.tsx';

/** One of the company's own scopes on its list. */
export function OwnScopeCard({ scope }: { scope: OwnScopeView }) {
  const { t } = useTranslation(['scopes', 'scope']);
  return (
    <article className={styles.card}>
      <CutSketch
        cuts={scope.cuts.map((line) => line.cut)}
        cutCount={scope.cutCount}
        look="card"
        empty={
          <Text size="2" color="gray">
            {t('card.noCuts')}
          </Text>
        }
      />
      <div className={styles.between}>
        <Heading as="h2" size="4" weight="medium">
          <TextLink to={paths.scope(scope.id)} color="gray" highContrast>
            {scope.title === '' ? t('untitled') : scope.title}
          </TextLink>
        </Heading>
        <ScopeStatusWord status={scope.status} />
      </div>
      <div className={styles.between}>
        <Text size="2">
          {scope.city === '' ? '' : t('card.place', { city: scope.city, state: scope.state })}
        </Text>
        <Text size="2" color="gray">
          {scope.number}
        </Text>
      </div>
      <Totals scope={scope} />
      <DueAndBids scope={scope} />
    </article>
  );
}

function Totals({ scope }: { scope: OwnScopeView }) {
  const { t } = useTranslation('scopes');
  const { totals } = scope;
  if (totals === null) return null;
  return (
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
  );
}

function DueAndBids({ scope }: { scope: OwnScopeView }) {
  const { t } = useTranslation(['scopes', 'scope']);
  if (scope.status === 'draft') {
    return (
      <Text size="2" color="gray">
        {t('card.changed', { at: formatDateTime(scope.updatedAt, scope.timeZone ?? deviceTimeZone()) })}
      </Text>
    );
  }
  return (
    <>
      {scope.dueAt !== null && <DueTime at={scope.dueAt} timeZone={scope.timeZone ?? 'UTC'} />}
      <div className={styles.between}>
        <Text size="2" weight="medium">
          {t('card.bids', { count: scope.bidCount })}
        </Text>
        <Text size="2" color="gray">
          {scope.mode === null ? '' : t(`scope:mode.${scope.mode}`)}
        </Text>
      </div>
    </>
  );
}
