import { scopeMachine, type ScopeAction, type ScopeDetailView } from '@kerfyard/common/scopes';
import { Button, Text } from '@radix-ui/themes';
import { useId, useState } from 'react';
import { useTranslation } from 'react-i18next';
import { ConfirmDialog } from '../../../components/confirm-dialog.tsx';
import formStyles from '../../../components/form/form.module.css';
import { useCloseScope, useWithdrawScope } from '../api/scope.mutations.ts';
import styles from './own-scope.module.css';

/** The ways a published scope ends without an award, as far as its state allows them. */
export function EndScope({ scope }: { scope: Pick<ScopeDetailView, 'id' | 'status'> }) {
  const allows = (action: ScopeAction) => action in scopeMachine.moves[scope.status];
  return (
    <>
      {allows('close') && <Close scopeId={scope.id} />}
      {allows('withdraw') && <Withdraw scopeId={scope.id} />}
    </>
  );
}

function Withdraw({ scopeId }: { scopeId: string }) {
  const { t } = useTranslation('scopes');
  const withdraw = useWithdrawScope(scopeId);
  return (
    <ConfirmDialog
      trigger={
        <Button variant="soft" color="gray" size="3">
          {t('own.withdraw')}
        </Button>
      }
      title={t('own.withdrawTitle')}
      text={t('own.withdrawText')}
      confirm={t('own.withdraw')}
      destructive
      onConfirm={() => withdraw.mutateAsync(undefined)}
    />
  );
}

function Close({ scopeId }: { scopeId: string }) {
  const { t } = useTranslation('scopes');
  const close = useCloseScope(scopeId);
  const [reason, setReason] = useState('');
  const id = useId();
  return (
    <ConfirmDialog
      trigger={
        <Button variant="soft" color="gray" size="3">
          {t('own.close')}
        </Button>
      }
      title={t('own.closeTitle')}
      text={t('own.closeText')}
      confirm={t('own.close')}
      destructive
      disabled={reason.trim() === ''}
      onConfirm={() => close.mutateAsync(reason.trim())}
    >
      <div className={styles.reason}>
        <label htmlFor={id}>
          <Text size="2" weight="medium">
            {t('own.reason')}
          </Text>
        </label>
        <textarea
          id={id}
          className={formStyles.control}
          rows={3}
          maxLength={500}
          aria-required
          value={reason}
          onChange={(event) => setReason(event.target.value)}
        />
      </div>
    </ConfirmDialog>
  );
}
