import type { AsCut, CompletionStatus, CompletionView } from '@kerfyard/common/completions';
import type { SubcontractView } from '@kerfyard/common/subcontracts';
import { Button, Text } from '@radix-ui/themes';
import { useTranslation } from 'react-i18next';
import { ConfirmDialog } from '../../../components/confirm-dialog.tsx';
import { FileThumbs } from '../../../components/file-thumb.tsx';
import { MoneyText } from '../../../components/money-text.tsx';
import { QueryErrorState } from '../../../components/states.tsx';
import { StatusWord, type StatusTone } from '../../../components/status-word.tsx';
import { formatDateTime, formatMoney, formatNumber, formatPercent } from '../../../lib/format.ts';
import { useIsLive } from '../../../lib/live.ts';
import { useFormId } from '../../../lib/use-form-id.ts';
import { useRelease } from '../../money/api/money.queries.ts';
import { useCan } from '../../session/hooks/use-session.ts';
import { useAcceptCompletion, useWithdrawCompletion } from '../api/completions.mutations.ts';
import styles from './completions.module.css';

const tones: Record<CompletionStatus, StatusTone> = {
  submitted: 'waiting',
  accepted: 'good',
  released: 'done',
  withdrawn: 'closed',
};

/** A completion as both sides read it, with the next move: accept, release, withdraw. */
export function CompletionCard({
  completion,
  subcontract,
}: {
  completion: CompletionView;
  subcontract: SubcontractView;
}) {
  const { t } = useTranslation('completions');
  const zone = subcontract.site.timeZone;
  const marks = new Map(subcontract.cuts.map((cut) => [cut.id, cut.mark]));
  const differing = completion.asCut.filter((row) => !row.asListed);
  return (
    <article className={styles.item}>
      <div className={styles.head}>
        <StatusWord tone={tones[completion.status]}>{t(`status.${completion.status}`)}</StatusWord>
        <MoneyText cents={completion.amountCents} weight="strong" />
      </div>
      <Text size="2" color="gray">
        {t('card.by', { person: completion.submittedBy, at: formatDateTime(completion.submittedAt, zone) })}
      </Text>
      <Text>
        {differing.length === 0
          ? t('card.allAsListed', { count: completion.asCut.length })
          : t('card.someDiffer', { count: differing.length, of: completion.asCut.length })}
      </Text>
      {differing.length > 0 && (
        <ul className={styles.plain}>
          {differing.map((row) => (
            <li key={row.cutId}>
              <Text>{t('card.found', { mark: marks.get(row.cutId) ?? '', found: foundWords(row) })}</Text>
            </li>
          ))}
        </ul>
      )}
      {completion.note !== '' && <Text>{completion.note}</Text>}
      <FileThumbs files={completion.photos} />
      {completion.status === 'submitted' && <Submitted completion={completion} subcontract={subcontract} />}
      {completion.status === 'accepted' && <Accepted completion={completion} subcontract={subcontract} />}
    </article>
  );
}

function foundWords(row: AsCut): string {
  const parts = [
    row.count === undefined ? '' : `× ${row.count}`,
    row.lengthFt === undefined ? '' : `${formatNumber(row.lengthFt)} ft`,
    row.depthIn === undefined ? '' : `${formatNumber(row.depthIn)} in`,
    row.note,
  ];
  return parts.filter((part) => part !== '').join(', ');
}

function Submitted({
  completion,
  subcontract,
}: {
  completion: CompletionView;
  subcontract: SubcontractView;
}) {
  const { t } = useTranslation('completions');
  const can = useCan();
  const isLive = useIsLive();
  const accept = useAcceptCompletion(subcontract.id);
  const withdraw = useWithdrawCompletion(subcontract.id);
  const amount = formatMoney(completion.amountCents);
  return (
    <>
      <Text size="2">
        {t('card.answerBy', { at: formatDateTime(completion.answerBy, subcontract.site.timeZone) })}
      </Text>
      {can('completion.accept') && (
        <div>
          <ConfirmDialog
            trigger={
              <Button size="3" disabled={!isLive}>
                {t('card.accept')}
              </Button>
            }
            title={t('card.acceptTitle', { amount })}
            text={t('card.acceptText')}
            confirm={t('card.accept')}
            disabled={!isLive}
            onConfirm={() => accept.mutateAsync(completion.id)}
          />
        </div>
      )}
      {can('completion.submit') && (
        <div>
          <Button
            variant="soft"
            color="gray"
            loading={withdraw.isPending}
            onClick={() => withdraw.mutate(completion.id)}
          >
            {t('card.withdraw')}
          </Button>
        </div>
      )}
      {withdraw.isError && <QueryErrorState error={withdraw.error} />}
    </>
  );
}

function Accepted({ completion, subcontract }: { completion: CompletionView; subcontract: SubcontractView }) {
  const { t } = useTranslation('completions');
  const can = useCan();
  const isLive = useIsLive();
  const form = useFormId();
  const release = useRelease(subcontract.id);
  const amount = formatMoney(completion.amountCents);
  const retained = subcontract.retainageBasisPoints / 10_000;
  if (!can('money.release')) return <Text size="2">{t('card.waitsForRelease')}</Text>;
  return (
    <div>
      <ConfirmDialog
        trigger={
          <Button size="3" disabled={!isLive}>
            {t('card.release', { amount })}
          </Button>
        }
        title={t('card.releaseTitle', { amount, crew: subcontract.crew.name })}
        text={t(retained > 0 ? 'card.releaseTextRetainage' : 'card.releaseText', {
          percent: formatPercent(retained, 1),
        })}
        confirm={t('card.release', { amount })}
        disabled={!isLive}
        onConfirm={() => release.mutateAsync({ id: form.id, completionId: completion.id })}
      />
    </div>
  );
}
