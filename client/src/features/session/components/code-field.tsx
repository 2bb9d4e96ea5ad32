import { Button } from '@radix-ui/themes';
import { useState } from 'react';
import type { FieldValues } from 'react-hook-form';
import { useTranslation } from 'react-i18next';
import { TextField, type Bound } from '../../../components/form/fields.tsx';
import styles from './sign-in-form.module.css';

/** A code of the authenticator app, which phones and password managers may fill in; or a recovery code instead. */
export function CodeField<Input extends FieldValues, Output>({ control, name }: Bound<Input, Output>) {
  const { t } = useTranslation();
  const [isRecovery, setIsRecovery] = useState(false);
  const words = isRecovery ? 'recoveryCode' : 'code';
  return (
    <div className={styles.code}>
      <TextField
        control={control}
        name={name}
        label={t(`fields.${words}`)}
        hint={t(`fields.${words}Hint`)}
        autoComplete={isRecovery ? 'off' : 'one-time-code'}
        inputMode={isRecovery ? 'text' : 'numeric'}
      />
      <Button type="button" variant="ghost" size="2" onClick={() => setIsRecovery(!isRecovery)}>
        {t(isRecovery ? 'fields.useApp' : 'fields.useRecoveryCode')}
      </Button>
    </div>
  );
}
