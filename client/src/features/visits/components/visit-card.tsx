import type { VisitView, VisitWindow } from '@kerfyard/common/visits';
import { Button, Text, TextArea } from '@radix-ui/themes';
import { useState } from 'react';
import { useTranslation } from 'react-i18next';
import { ConfirmDialog } from '../../../components/confirm-dialog.tsx';
import { TextLink } from '../../../components/link.tsx';
import { QueryErrorState } from '../../../components/states.tsx';
import { StatusWord } from '../../../components/status-word.tsx';
import { formatDateTime, formatTime } from '../../../lib/format.ts';
import { useIsLive } from '../../../lib/live.ts';
import { paths } from '../../../lib/paths.ts';
import { useCan } from '../../session/hooks/use-session.ts';
import { useCancelVisit, useConfirmVisit, useFinishVisit, useStartVisit } from '../api/visits.queries.ts';
import { VisitStatusWord } from './visit-status.tsx';
import styles from './visits.module.css';

/** One visit: when, who, and the next move for whoever reads it. */
export function VisitCard({ visit }: { visit: VisitView }) {
  const { t } = useTranslation('visits');
  return (
    <article className={`${styles.visit} k-field`}>
      <div className={styles.head}>
        <VisitStatusWord status={visit.status} />
        <Text size="2" color="gray">
          {t('week.unit', { crew: visit.crew.name, truck: visit.truck.name })}
        </Text>
      </div>
      {visit.window !== null && <Text weight="medium">{windowWords(visit.window, visit.timeZone)}</Text>}
      {visit.note !== '' && <Text>{visit.note}</Text>}
      {visit.status === 'cancelled' && <Text color="gray">{visit.cancelReason}</Text>}
      {visit.status !== 'cancelled' && (
        <TextLink to={paths.jobSheet(visit.subcontractId, visit.id)}>{t('card.jobSheet')}</TextLink>
      )}
      {visit.status === 'proposed' && <Offers visit={visit} />}
      {visit.status === 'confirmed' && <Ready visit={visit} />}
      {visit.status === 'on_site' && <OnSite visit={visit} />}
      {(visit.status === 'proposed' || visit.status === 'confirmed') && <Cancel visit={visit} />}
    </article>
  );
}

function windowWords(window: VisitWindow, timeZone: string): string {
  return `${formatDateTime(window.startsAt, timeZone)} – ${formatTime(window.endsAt, timeZone)}`;
}

function Offers({ visit }: { visit: VisitView }) {
  const { t } = useTranslation('visits');
  const can = useCan();
  const isLive = useIsLive();
  const confirm = useConfirmVisit(visit.id);
  return (
    <>
      <ul className={styles.plain}>
        {visit.windows.map((window) => (
          <li key={window.startsAt} className={styles.row}>
            <Text>{windowWords(window, visit.timeZone)}</Text>
            {can('visit.confirm') && (
              <Button
                size="3"
                disabled={!isLive || confirm.isPending}
                aria-label={t('card.takeThis', { window: windowWords(window, visit.timeZone) })}
                onClick={() => confirm.mutate(window)}
              >
                {t('card.take')}
              </Button>
            )}
          </li>
        ))}
      </ul>
      {!can('visit.confirm') && <Text color="gray">{t('card.waitingForGc', { name: visit.gc.name })}</Text>}
      {confirm.isError && <QueryErrorState error={confirm.error} />}
    </>
  );
}

function Ready({ visit }: { visit: VisitView }) {
  const { t } = useTranslation('visits');
  const can = useCan();
  const start = useStartVisit(visit.id);
  return (
    <>
      {visit.linesSetAside ? (
        <StatusWord tone="good">{t('card.setAside')}</StatusWord>
      ) : (
        <StatusWord tone="warn">{t('card.notSetAside')}</StatusWord>
      )}
      {can('visit.work') && (
        <div>
          <Button
            size="4"
            disabled={!visit.linesSetAside}
            loading={start.isPending}
            onClick={() => start.mutate(undefined)}
          >
            {t('card.start')}
          </Button>
        </div>
      )}
      {start.isError && <QueryErrorState error={start.error} />}
    </>
  );
}

function OnSite({ visit }: { visit: VisitView }) {
  const { t } = useTranslation('visits');
  const can = useCan();
  const finish = useFinishVisit(visit.id);
  return (
    <>
      {visit.startedAt !== null && (
        <Text>{t('card.since', { at: formatDateTime(visit.startedAt, visit.timeZone) })}</Text>
      )}
      {can('visit.work') && (
        <div>
          <Button size="4" loading={finish.isPending} onClick={() => finish.mutate(undefined)}>
            {t('card.finish')}
          </Button>
        </div>
      )}
      {finish.isError && <QueryErrorState error={finish.error} />}
    </>
  );
}

function Cancel({ visit }: { visit: VisitView }) {
  const { t } = useTranslation('visits');
  const can = useCan();
  const [reason, setReason] = useState('');
  const cancel = useCancelVisit(visit.id);
  if (!can('visit.confirm') && !can('visit.propose')) return null;
  return (
    <div>
      <ConfirmDialog
        trigger={
          <Button variant="soft" color="gray">
            {t('card.cancel')}
          </Button>
        }
        title={t('card.cancelTitle')}
        text={t('card.cancelText')}
        confirm={t('card.cancel')}
        destructive
        disabled={reason.trim() === ''}
        onConfirm={() => cancel.mutateAsync(reason.trim())}
      >
        <label>
          <Text as="div" size="2" weight="medium" mb="1">
            {t('card.reason')}
          </Text>
          <TextArea
            rows={2}
            maxLength={500}
            value={reason}
            onChange={(event) => setReason(event.target.value)}
          />
        </label>
      </ConfirmDialog>
    </div>
  );
}
