import type { SubcontractView } from '@kerfyard/common/subcontracts';
import { Button, Heading, Text } from '@radix-ui/themes';
import { useQuery } from '@tanstack/react-query';
import { useState } from 'react';
import { useTranslation } from 'react-i18next';
import { useParams, type LoaderFunctionArgs } from 'react-router-dom';
import { CutSketch } from '../components/cut-sketch.tsx';
import { FileThumbs } from '../components/file-thumb.tsx';
import { ButtonLink } from '../components/link.tsx';
import { MoneyLine } from '../components/money-line.tsx';
import { Page } from '../components/page.tsx';
import { Loading, QueryErrorState } from '../components/states.tsx';
import { CompletionCard } from '../features/completions/components/completion-card.tsx';
import { CompletionForm } from '../features/completions/components/completion-form.tsx';
import { useCan } from '../features/session/hooks/use-session.ts';
import { TalkSection } from '../features/talk/components/talk-section.tsx';
import { ThreadPanel } from '../features/talk/components/thread-panel.tsx';
import { ProposeVisit } from '../features/visits/components/propose-visit.tsx';
import { VisitCard } from '../features/visits/components/visit-card.tsx';
import { subcontractQuery } from '../features/work/api/work.queries.ts';
import { NextStep } from '../features/work/components/next-step.tsx';
import { Paper } from '../features/work/components/paper.tsx';
import { SovTable } from '../features/work/components/sov-table.tsx';
import { SubcontractStatusWord } from '../features/work/components/subcontract-status.tsx';
import styles from '../features/work/components/work.module.css';
import { useSubcontractHints } from '../features/work/hooks/use-subcontract-hints.ts';
import { paths } from '../lib/paths.ts';
import { queryClient } from '../lib/query-client.ts';

export function loader({ params }: LoaderFunctionArgs) {
  void queryClient.prefetchQuery(subcontractQuery(params.subcontractId ?? ''));
  return null;
}

/** One subcontract: paper, lines and money, visits, completions. */
export default function WorkItemPage() {
  const { t } = useTranslation('work');
  const { subcontractId = '' } = useParams();
  const subcontract = useQuery(subcontractQuery(subcontractId));
  useSubcontractHints(subcontractId);
  if (subcontract.data !== undefined) return <Subcontract subcontract={subcontract.data} />;
  return (
    <Page title={t('title')}>
      {subcontract.isError ? (
        <QueryErrorState error={subcontract.error} onRetry={() => void subcontract.refetch()} />
      ) : (
        <Loading />
      )}
    </Page>
  );
}

function Subcontract({ subcontract }: { subcontract: SubcontractView }) {
  const { t } = useTranslation(['work', 'talk']);
  const can = useCan();
  const other = subcontract.side === 'gc' ? subcontract.crew : subcontract.gc;
  const { site } = subcontract;
  const isSigned = subcontract.status === 'active' || subcontract.status === 'completed';
  const paper = <Paper subcontract={subcontract} canSign={can('subcontract.sign')} />;
  return (
    <Page
      title={subcontract.title}
      lead={
        <>
          <SubcontractStatusWord status={subcontract.status} /> {subcontract.number} ·{' '}
          {t('item.with', { name: other.name })} · {site.address}, {site.city}, {site.state}
        </>
      }
      width="wide"
      actions={
        <ButtonLink to={paths.workMoney(subcontract.id)} size="3" variant="soft">
          {t('item.money')}
        </ButtonLink>
      }
    >
      <div className={styles.stack}>
        <div className={styles.section}>
          <MoneyLine money={subcontract.money} />
          <NextStep subcontract={subcontract} />
        </div>
        <div className={styles.columns}>
          <div className={styles.stack}>
            {isSigned ? (
              <>
                <Visits subcontract={subcontract} />
                {subcontract.visits.length > 0 && <Completions subcontract={subcontract} />}
              </>
            ) : (
              paper
            )}
            <SovTable subcontract={subcontract} />
          </div>
          <div className={styles.stack}>
            <Cuts subcontract={subcontract} />
            <TalkSection title={t('talk:with', { name: other.name })}>
              <ThreadPanel threadId={subcontract.threadId} />
            </TalkSection>
            {isSigned && paper}
          </div>
        </div>
      </div>
    </Page>
  );
}

function Cuts({ subcontract }: { subcontract: SubcontractView }) {
  const { t } = useTranslation('work');
  return (
    <section className={styles.section} aria-labelledby="cuts">
      <Heading as="h2" size="5" weight="medium" id="cuts">
        {t('item.cuts')}
      </Heading>
      <CutSketch cuts={subcontract.cuts.map((line) => line.cut)} />
      <FileThumbs files={subcontract.files} />
    </section>
  );
}

function Visits({ subcontract }: { subcontract: SubcontractView }) {
  const { t } = useTranslation('work');
  const can = useCan();
  const [proposing, setProposing] = useState(false);
  const isPlanned = subcontract.visits.some((visit) => visit.status !== 'cancelled');
  const mayPropose = subcontract.status === 'active' && can('visit.propose');
  return (
    <section className={styles.section} aria-labelledby="visits">
      <Heading as="h2" size="5" weight="medium" id="visits">
        {t('item.visits')}
      </Heading>
      {subcontract.visits.length === 0 && !proposing && (
        <Text color="gray">{t(subcontract.side === 'crew' ? 'item.noVisitsCrew' : 'item.noVisitsGc')}</Text>
      )}
      {subcontract.visits.map((visit) => (
        <VisitCard key={visit.id} visit={visit} />
      ))}
      {mayPropose && !proposing && (
        <div>
          <Button size="3" variant={isPlanned ? 'soft' : 'solid'} onClick={() => setProposing(true)}>
            {t('item.propose')}
          </Button>
        </div>
      )}
      {proposing && <ProposeVisit subcontract={subcontract} onDone={() => setProposing(false)} />}
    </section>
  );
}

function Completions({ subcontract }: { subcontract: SubcontractView }) {
  const { t } = useTranslation('work');
  const can = useCan();
  const setAside = new Set(
    subcontract.sov.filter((line) => line.state === 'set_aside').map((line) => line.id),
  );
  const worked = subcontract.visits.filter(
    (visit) =>
      (visit.status === 'on_site' || visit.status === 'finished') &&
      visit.sovLineIds.some((id) => setAside.has(id)),
  );
  return (
    <section className={styles.section} aria-labelledby="completion">
      <Heading as="h2" size="5" weight="medium" id="completion">
        {t('item.completion')}
      </Heading>
      {subcontract.completions.length === 0 && worked.length === 0 && (
        <Text color="gray">{t('item.noCompletion')}</Text>
      )}
      {subcontract.completions.map((completion) => (
        <CompletionCard key={completion.id} completion={completion} subcontract={subcontract} />
      ))}
      {can('completion.submit') &&
        worked.map((visit) => (
          <div key={visit.id} className={`${styles.item} k-field`}>
            <Heading as="h3" size="4" weight="medium">
              {t('item.complete')}
            </Heading>
            <CompletionForm subcontract={subcontract} visit={visit} />
          </div>
        ))}
    </section>
  );
}
