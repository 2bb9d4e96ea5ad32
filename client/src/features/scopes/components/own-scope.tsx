import type { ScopeBody as Body, ScopeDetailView } from '@kerfyard/common/scopes';
import { Heading, Text } from '@radix-ui/themes';
import { useTranslation } from 'react-i18next';
import { DueTime } from '../../../components/countdown.tsx';
import { ButtonLink } from '../../../components/link.tsx';
import { Page } from '../../../components/page.tsx';
import { formatDateTime } from '../../../lib/format.ts';
import { paths } from '../../../lib/paths.ts';
import { useCan } from '../../session/hooks/use-session.ts';
import { ScopeThreads } from '../../talk/components/scope-threads.tsx';
import { EndScope } from './end-scope.tsx';
import styles from './own-scope.module.css';
import { ScopeBody } from './scope-body.tsx';
import { ScopeStatusWord } from './scope-status.tsx';

/** A published scope as its own company reads it: what went out, and who bids on it. */
export function OwnScope({ scope, onDue }: { scope: ScopeDetailView; onDue: () => void }) {
  const { body } = scope;
  if (body === null) return null;
  return (
    <Page
      title={body.title}
      width="wide"
      lead={
        <>
          <ScopeStatusWord status={scope.status} /> {scope.number} · {body.site.city}, {body.site.state}
        </>
      }
    >
      <div className={styles.columns}>
        <ScopeBody scope={scope} body={body} />
        <aside className={styles.aside}>
          <BidsPanel scope={scope} body={body} onDue={onDue} />
          <ScopeThreads scopeId={scope.id} />
        </aside>
      </div>
    </Page>
  );
}

function BidsPanel({ scope, body, onDue }: { scope: ScopeDetailView; body: Body; onDue: () => void }) {
  const { t } = useTranslation(['scopes', 'scope']);
  const can = useCan();
  const { timeZone } = body.site;
  const count = scope.bidCount ?? 0;
  const isOpen = scope.status === 'open';
  return (
    <section className={styles.panel} aria-labelledby="bids">
      <Heading as="h2" size="4" weight="medium" id="bids">
        {t(`scope:mode.${body.bidding.mode}`)}
      </Heading>
      <div>
        <Text as="div" size="2" color="gray">
          {t('own.due')}
        </Text>
        <DueTime at={scope.dueAt ?? body.bidding.dueAt} timeZone={timeZone} onPassed={onDue} />
      </div>
      <Text as="p" size="4" weight="medium">
        {count === 0 ? t('own.noBids') : t('own.bidsIn', { count })}
      </Text>
      {isOpen && (
        <Text as="p" size="2" color="gray">
          {t(body.bidding.mode === 'sealed' ? 'own.sealedUntil' : 'own.rankedNow')}
        </Text>
      )}
      {scope.closedReason !== null && scope.closedReason !== '' && (
        <Text as="p">{t('own.closedReason', { reason: scope.closedReason })}</Text>
      )}
      <div className={styles.row}>
        {scope.subcontractId !== null && (
          <ButtonLink to={paths.workItem(scope.subcontractId)} size="3">
            {t('own.toWork')}
          </ButtonLink>
        )}
        {can('bid.tabulate') && scope.status !== 'withdrawn' && (
          <ButtonLink
            to={paths.scopeBids(scope.id)}
            size="3"
            variant={scope.status === 'due' ? 'solid' : 'soft'}
          >
            {t(scope.status === 'due' ? 'own.compare' : 'own.toBids')}
          </ButtonLink>
        )}
        {can('scope.write') && <EndScope scope={scope} />}
      </div>
      {scope.publishedAt !== null && (
        <Text as="p" size="2" color="gray">
          {t('own.revision', {
            revision: scope.revision ?? 1,
            at: formatDateTime(scope.publishedAt, timeZone),
          })}
        </Text>
      )}
    </section>
  );
}
