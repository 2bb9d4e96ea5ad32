import { awardSchema, type Award } from '@kerfyard/common/bids';
import { Button, Text } from '@radix-ui/themes';
import { useId, useState } from 'react';
import { useTranslation } from 'react-i18next';
import { useNavigate } from 'react-router-dom';
import { ConfirmDialog } from '../../../components/confirm-dialog.tsx';
import formStyles from '../../../components/form/form.module.css';
import { formatMoney } from '../../../lib/format.ts';
import { useIsLive } from '../../../lib/live.ts';
import { paths } from '../../../lib/paths.ts';
import { useFormId } from '../../../lib/use-form-id.ts';
import { useAward } from '../api/tabulation.queries.ts';
import type { ComparedBid } from '../compare.ts';
import styles from './tabulation.module.css';

/** Award one bid: at what price, and what the others are told. Nothing happens before the server says so. */
export function AwardDialog({ scopeId, compared }: { scopeId: string; compared: ComparedBid }) {
  const { t } = useTranslation('tabulation');
  const { bid, row } = compared;
  const award = useAward(scopeId);
  const navigate = useNavigate();
  const isLive = useIsLive();
  const { id: key, renew } = useFormId();
  const [reason, setReason] = useState<Award['reason']>('price');
  const [note, setNote] = useState('');
  const crew = bid.crew.name;
  const confirm = async () => {
    try {
      const { subcontractId } = await award.mutateAsync({
        award: { bidId: bid.id, reason, note: note.trim() },
        key,
      });
      await navigate(paths.workItem(subcontractId));
    } catch (error) {
      // A refusal is remembered under its key; the next press is a new request.
      renew();
      throw error;
    }
  };
  return (
    <ConfirmDialog
      trigger={
        <Button size="3" disabled={!isLive} aria-label={t('award.buttonFor', { crew })}>
          {t('award.button')}
        </Button>
      }
      title={t('award.title', { crew })}
      text={t('award.text', { price: formatMoney(row.baseCents) })}
      confirm={t('award.button')}
      disabled={!isLive}
      onConfirm={confirm}
    >
      <Reason reason={reason} note={note} onReason={setReason} onNote={setNote} />
      {row.unclear > 0 && (
        <Text as="p" size="2" mt="3">
          {t('unclear', { count: row.unclear })}
        </Text>
      )}
      {!isLive && (
        <Text as="p" size="2" color="red" role="alert">
          {t('award.notLive')}
        </Text>
      )}
    </ConfirmDialog>
  );
}

function Reason(props: {
  reason: Award['reason'];
  note: string;
  onReason: (reason: Award['reason']) => void;
  onNote: (note: string) => void;
}) {
  const { t } = useTranslation('tabulation');
  const id = useId();
  return (
    <div className={styles.reason}>
      <label htmlFor={`${id}-reason`} className={formStyles.label}>
        {t('award.reason')}
      </label>
      <select
        id={`${id}-reason`}
        className={formStyles.control}
        value={props.reason}
        onChange={(event) => props.onReason(event.target.value as Award['reason'])}
      >
        {awardSchema.shape.reason.options.map((reason) => (
          <option key={reason} value={reason}>
            {t(`award.reasons.${reason}`)}
          </option>
        ))}
      </select>
      <label htmlFor={`${id}-note`} className={formStyles.label}>
        {t('award.note')} <span className={formStyles.optional}>{t('shell:form.optional')}</span>
      </label>
      <textarea
        id={`${id}-note`}
        className={formStyles.control}
        rows={2}
        maxLength={500}
        aria-describedby={`${id}-hint`}
        value={props.note}
        onChange={(event) => props.onNote(event.target.value)}
      />
      <span id={`${id}-hint`} className={formStyles.hint}>
        {t('award.noteHint')}
      </span>
    </div>
  );
}
