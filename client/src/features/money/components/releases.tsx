import type { ReleaseStatus } from '@kerfyard/common/payments';
import type { SubcontractView } from '@kerfyard/common/subcontracts';
import { Button, Heading, Text } from '@radix-ui/themes';
import { useTranslation } from 'react-i18next';
import { ConfirmDialog } from '../../../components/confirm-dialog.tsx';
import { MoneyText } from '../../../components/money-text.tsx';
import { StatusWord, type StatusTone } from '../../../components/status-word.tsx';
import { formatDateTime, formatMoney, formatPercent } from '../../../lib/format.ts';
import { useIsLive } from '../../../lib/live.ts';
import { useFormId } from '../../../lib/use-form-id.ts';
import { useRelease } from '../api/money.queries.ts';
import { Amounts } from './amounts.tsx';
import styles from './money.module.css';

const tones: Record<ReleaseStatus, StatusTone> = { posted: 'waiting', blocked: 'warn', transferred: 'done' };

/** Accepted work that waits for its money: for those who may release it. */
export function AcceptedWork({
  subcontract,
  canRelease,
}: {
  subcontract: SubcontractView;
  canRelease: boolean;
}) {
  const accepted = subcontract.completions.filter((completion) => completion.status === 'accepted');
  return (
    <>
      {accepted.map((completion) => (
        <AcceptedCompletion
          key={completion.id}
          subcontract={subcontract}
          completionId={completion.id}
          amountCents={completion.amountCents}
          canRelease={canRelease}
        />
      ))}
    </>
  );
}

function AcceptedCompletion(props: {
  subcontract: SubcontractView;
  completionId: string;
  amountCents: number;
  canRelease: boolean;
}) {
  const { t } = useTranslation('money');
  const isLive = useIsLive();
  const form = useFormId();
  const release = useRelease(props.subcontract.id);
  const amount = formatMoney(props.amountCents);
  const retained = props.subcontract.retainageBasisPoints / 10_000;
  return (
    <section className={styles.item} aria-label={t('accepted.title')}>
      <Heading as="h2" size="4" weight="medium">
        {t('accepted.title')}
      </Heading>
      <Text>{t('accepted.text', { amount })}</Text>
      {props.canRelease && (
        <div>
          <ConfirmDialog
            trigger={
              <Button size="3" disabled={!isLive}>
                {t('accepted.press', { amount })}
              </Button>
            }
            title={t('accepted.confirmTitle', { amount, crew: props.subcontract.crew.name })}
            text={t(retained > 0 ? 'accepted.confirmTextRetainage' : 'accepted.confirmText', {
              percent: formatPercent(retained, 1),
            })}
            confirm={t('accepted.press', { amount })}
            disabled={!isLive}
            onConfirm={() => release.mutateAsync({ id: form.id, completionId: props.completionId })}
          />
        </div>
      )}
    </section>
  );
}

/** What was released, how it was divided, and how far its transfer is. */
export function Releases({ subcontract }: { subcontract: SubcontractView }) {
  const { t } = useTranslation('money');
  return (
    <section className={styles.section} aria-labelledby="releases">
      <Heading as="h2" size="5" weight="medium" id="releases">
        {t('releases.title')}
      </Heading>
      {subcontract.releases.length === 0 && <Text color="gray">{t('releases.empty')}</Text>}
      {[...subcontract.releases].reverse().map((release) => (
        <article key={release.id} className={styles.item}>
          <div className={styles.itemHead}>
            <StatusWord tone={tones[release.status]}>{t(`releases.status.${release.status}`)}</StatusWord>
            <MoneyText cents={release.grossCents} weight="strong" />
          </div>
          <Text size="2" color="gray">
            {formatDateTime(release.transferredAt ?? release.postedAt, subcontract.site.timeZone)}
          </Text>
          {release.blockedBecause !== null && (
            <Text size="2">{t(`releases.blocked.${release.blockedBecause}`)}</Text>
          )}
          <Amounts
            rows={[
              { label: t('releases.gross'), cents: release.grossCents },
              ...(release.retainageCents > 0
                ? [{ label: t('releases.retainage'), cents: -release.retainageCents }]
                : []),
              { label: t('releases.fee'), cents: -release.feeCents },
              { label: t('releases.crew'), cents: release.crewCents, isTotal: true },
            ]}
          />
        </article>
      ))}
    </section>
  );
}
