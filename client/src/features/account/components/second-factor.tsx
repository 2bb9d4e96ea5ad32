import type { AccountView, NewSecondFactorView } from '@kerfyard/common/people';
import { Button, Text } from '@radix-ui/themes';
import { useQueryClient } from '@tanstack/react-query';
import { useState } from 'react';
import { useTranslation } from 'react-i18next';
import { ConfirmDialog } from '../../../components/confirm-dialog.tsx';
import { StatusWord } from '../../../components/status-word.tsx';
import { useErrorWords } from '../../../lib/error-words.ts';
import {
  accountKeys,
  useBeginSecondFactor,
  useRemoveSecondFactor,
  useRenewRecoveryCodes,
} from '../api/account.queries.ts';
import styles from './account.module.css';
import { RecoveryCodes } from './recovery-codes.tsx';
import { SecondFactorSetup } from './second-factor-setup.tsx';
import { Section } from './section.tsx';

/** A code from an authenticator app beside the password: set up, its recovery codes, taken away. */
export function SecondFactor({ factor }: { factor: AccountView['secondFactor'] }) {
  const { t } = useTranslation('account');
  const client = useQueryClient();
  const [secret, setSecret] = useState<NewSecondFactorView | null>(null);
  const [codes, setCodes] = useState<readonly string[] | null>(null);
  const showCodes = (fresh: readonly string[]) => {
    setSecret(null);
    setCodes(fresh);
    void client.invalidateQueries({ queryKey: accountKeys.own });
  };
  const state = factor.isSet ? 'set' : factor.isRequired ? 'required' : 'none';
  const tone = factor.isSet ? 'good' : factor.isRequired ? 'warn' : 'quiet';
  return (
    <Section
      title={t('factor.title')}
      text={t('factor.text')}
      state={<StatusWord tone={tone}>{t(`factor.state.${state}`)}</StatusWord>}
    >
      {codes !== null ? (
        <RecoveryCodes codes={codes} onKept={() => setCodes(null)} />
      ) : secret !== null ? (
        <SecondFactorSetup secret={secret} onSet={showCodes} onLeave={() => setSecret(null)} />
      ) : factor.isSet ? (
        <Present left={factor.recoveryCodesLeft} onRenewed={showCodes} />
      ) : (
        <Begin onBegun={setSecret} />
      )}
    </Section>
  );
}

function Begin({ onBegun }: { onBegun: (secret: NewSecondFactorView) => void }) {
  const { t } = useTranslation('account');
  const words = useErrorWords();
  const begin = useBeginSecondFactor();
  return (
    <>
      <Button
        size="3"
        variant="soft"
        loading={begin.isPending}
        onClick={() => begin.mutate(undefined, { onSuccess: onBegun })}
      >
        {t('factor.begin')}
      </Button>
      <div role="alert">
        {begin.isError && (
          <Text as="p" color="red" mt="2">
            {words(begin.error).what}
          </Text>
        )}
      </div>
    </>
  );
}

function Present({ left, onRenewed }: { left: number; onRenewed: (codes: readonly string[]) => void }) {
  const { t } = useTranslation('account');
  const renew = useRenewRecoveryCodes();
  const remove = useRemoveSecondFactor();
  return (
    <>
      <Text as="p" size="2" mb="3">
        {t('codes.left', { count: left })}
      </Text>
      <div className={styles.buttons}>
        <ConfirmDialog
          trigger={
            <Button variant="soft" size="3">
              {t('codes.renew')}
            </Button>
          }
          title={t('codes.renew')}
          text={t('codes.renewText')}
          confirm={t('codes.renew')}
          onConfirm={async () => onRenewed((await renew.mutateAsync(undefined)).codes)}
        />
        <ConfirmDialog
          trigger={
            <Button variant="soft" color="red" size="3">
              {t('factor.remove')}
            </Button>
          }
          title={t('factor.remove')}
          text={t('factor.removeText')}
          confirm={t('factor.remove')}
          destructive
          onConfirm={() => remove.mutateAsync(undefined)}
        />
      </div>
    </>
  );
}
