import type { SubcontractView } from '@kerfyard/common/subcontracts';
import type { VisitView } from '@kerfyard/common/visits';
import { Button } from '@radix-ui/themes';
import { useQuery } from '@tanstack/react-query';
import { useMemo } from 'react';
import { useTranslation } from 'react-i18next';
import { useParams, useSearchParams, type LoaderFunctionArgs } from 'react-router-dom';
import { CutSketch } from '../components/cut-sketch.tsx';
import { ButtonLink } from '../components/link.tsx';
import { Page } from '../components/page.tsx';
import { Loading, QueryErrorState } from '../components/states.tsx';
import { CalculatorView } from '../features/calculators/components/calculator-view.tsx';
import { JobSheetFacts } from '../features/job-sheet/components/job-sheet-facts.tsx';
import { jobSheet } from '../features/job-sheet/job-sheet.tsx';
import { CutTable } from '../features/scopes/components/cut-table.tsx';
import { subcontractQuery } from '../features/work/api/work.queries.ts';
import styles from '../features/work/components/work.module.css';
import { paths } from '../lib/paths.ts';
import { queryClient } from '../lib/query-client.ts';

export function loader({ params }: LoaderFunctionArgs) {
  void queryClient.prefetchQuery(subcontractQuery(params.subcontractId ?? ''));
  return null;
}

/** What the crew takes to the wall: passes, blades, dust, noise, vibration, weights, water and cautions. */
export default function JobSheetPage() {
  const { t } = useTranslation('calculators');
  const { subcontractId = '' } = useParams();
  const [search] = useSearchParams();
  const subcontract = useQuery(subcontractQuery(subcontractId));
  if (subcontract.data !== undefined) {
    return <JobSheet subcontract={subcontract.data} visitId={search.get('visit')} />;
  }
  return (
    <Page title={t('jobSheet.title')}>
      {subcontract.isError ? (
        <QueryErrorState error={subcontract.error} onRetry={() => void subcontract.refetch()} />
      ) : (
        <Loading />
      )}
    </Page>
  );
}

function JobSheet({ subcontract, visitId }: { subcontract: SubcontractView; visitId: string | null }) {
  const { t } = useTranslation('calculators');
  const visit = subcontract.visits.find((one) => one.id === visitId) ?? null;
  const cuts = useMemo(() => cutsOf(subcontract, visit), [subcontract, visit]);
  const sheet = useMemo(() => jobSheet({ cuts, conditions: subcontract.conditions }), [cuts, subcontract]);
  return (
    <Page
      title={t('jobSheet.title')}
      lead={`${subcontract.title}, ${subcontract.number}`}
      width="wide"
      actions={
        <div className="k-no-print">
          <ButtonLink to={paths.workItem(subcontract.id)} variant="soft" color="gray" mr="2">
            {t('jobSheet.toWork')}
          </ButtonLink>
          <Button onClick={() => window.print()}>{t('jobSheet.print')}</Button>
        </div>
      }
    >
      <div className={styles.stack}>
        <JobSheetFacts subcontract={subcontract} visit={visit} />
        <div className={styles.columns}>
          <CutTable cuts={cuts} />
          <CutSketch cuts={cuts.map((line) => line.cut)} />
        </div>
        <CalculatorView key={visit?.id ?? 'all'} calculator={sheet} isSheet />
      </div>
    </Page>
  );
}

/** The cuts of the visit's lines; the whole list where the lines name none, or no visit is asked for. */
function cutsOf(subcontract: SubcontractView, visit: VisitView | null) {
  if (visit === null) return subcontract.cuts;
  const ids = new Set(
    subcontract.sov.filter((line) => visit.sovLineIds.includes(line.id)).flatMap((line) => line.cutIds),
  );
  const own = subcontract.cuts.filter((line) => ids.has(line.id));
  return own.length === 0 ? subcontract.cuts : own;
}
