import type { ScopeBody, ScopeDetailView } from '@kerfyard/common/scopes';
import { Heading, Text } from '@radix-ui/themes';
import { useQuery } from '@tanstack/react-query';
import { useState } from 'react';
import { useTranslation } from 'react-i18next';
import { TextLink } from '../../../components/link.tsx';
import { Loading, QueryErrorState } from '../../../components/states.tsx';
import { readTail } from '../../../lib/draft-tail.ts';
import { paths } from '../../../lib/paths.ts';
import { companyQuery } from '../../company/api/company.queries.ts';
import { useCan } from '../../session/hooks/use-session.ts';
import { bidDraftQuery, ownBidQuery } from '../api/bids.queries.ts';
import { bidValues, emptyBid, type BidFormValues } from '../bid-form-values.ts';
import { BidForm } from './bid-form.tsx';
import styles from './bids.module.css';
import { OwnBid } from './own-bid.tsx';

/** Beside a scope: the crew's own bid, or the form for one, or what is missing before it may bid. */
export function BidPanel({ scope, body }: { scope: ScopeDetailView; body: ScopeBody }) {
  const { t } = useTranslation('bid');
  const can = useCan();
  const own = useQuery(ownBidQuery(scope.id));
  const draft = useQuery(bidDraftQuery(scope.id));
  const company = useQuery(companyQuery);
  const [revising, setRevising] = useState(false);
  if (own.isError) return <QueryErrorState error={own.error} onRetry={() => void own.refetch()} />;
  if (own.data === undefined || draft.isPending || company.data === undefined) return <Loading />;
  const mayBid = can('bid.write');
  const bid = own.data;
  if (bid !== null && !revising) {
    return (
      <OwnBid
        bid={bid}
        scope={scope}
        timeZone={body.site.timeZone}
        onRevise={mayBid ? () => setRevising(true) : null}
      />
    );
  }
  const obstacle = obstacleOf(scope, mayBid, company.data.ladder.bid);
  return (
    <section className={styles.panel} aria-labelledby="bid">
      <Heading as="h2" size="4" weight="medium" id="bid">
        {t(bid === null ? 'form.title' : 'form.reviseTitle')}
      </Heading>
      {obstacle !== null ? (
        <Text>
          {t(`form.${obstacle}`)}{' '}
          {obstacle === 'incomplete' && <TextLink to={paths.company}>{t('form.toCompany')}</TextLink>}
        </Text>
      ) : (
        <BidForm
          scopeId={scope.id}
          revision={scope.revision ?? 1}
          body={body}
          start={bid === null ? startOf(scope.id, body, draft.data?.draft ?? null) : bidValues(body, bid)}
          ownBid={bid}
          offered={company.data.methods}
          distanceMi={scope.distanceMi}
          onDone={() => setRevising(false)}
        />
      )}
    </section>
  );
}

/** Why there is no form, in the order a person would ask. */
function obstacleOf(
  scope: ScopeDetailView,
  mayBid: boolean,
  missing: readonly string[],
): 'closed' | 'role' | 'incomplete' | null {
  if (scope.status !== 'open') return 'closed';
  if (!mayBid) return 'role';
  return missing.length > 0 ? 'incomplete' : null;
}

/** What was typed last: what this tab has kept, else the draft of the server, else an empty form. */
function startOf(scopeId: string, body: ScopeBody, saved: Record<string, unknown> | null): BidFormValues {
  const empty = emptyBid(body);
  const typed = (readTail(`bid.${scopeId}`) ?? saved) as Partial<BidFormValues> | null | undefined;
  if (typed === null || typeof typed !== 'object') return empty;
  // Drafts may be of an older revision: lines and answers keep only what the scope still has.
  const lines = Array.isArray(typed.lines) ? typed.lines : [];
  const answers = Array.isArray(typed.answers) ? typed.answers : [];
  return {
    ...empty,
    ...typed,
    lines: empty.lines.map((line) => ({ ...line, ...lines.find((one) => one?.cutId === line.cutId) })),
    factors: { ...empty.factors, ...typed.factors },
    answers: empty.answers.map((row) => answers.find((one) => one?.item === row.item) ?? row),
  };
}
