import { confirmWithCodeSchema, confirmWithPasswordSchema } from '@kerfyard/common/people';
import { Button, Dialog } from '@radix-ui/themes';
import { useTranslation } from 'react-i18next';
import { TextField } from '../../../components/form/fields.tsx';
import { Form } from '../../../components/form/form.tsx';
import { useAppForm } from '../../../lib/app-form.ts';
import { confirmGate, type Proof } from '../../../lib/confirm-gate.ts';
import { postConfirm } from '../api/session.queries.ts';
import { CodeField } from './code-field.tsx';
import styles from './sign-in-form.module.css';

/** Password or code, in place; what is on the page stays as it is and goes on. */
export default function ConfirmYouDialog({ proof }: { proof: Proof }) {
  const { t } = useTranslation();
  return (
    <Dialog.Root open onOpenChange={(open) => !open && confirmGate.answer(false)}>
      <Dialog.Content maxWidth="26rem" onOpenAutoFocus={focusFirstField}>
        <Dialog.Title>{t('confirmYou.title')}</Dialog.Title>
        <Dialog.Description size="2" color="gray" mb="4">
          {t(`confirmYou.${proof}`)}
        </Dialog.Description>
        {proof === 'password' ? <ByPassword /> : <ByCode />}
      </Dialog.Content>
    </Dialog.Root>
  );
}

function ByPassword() {
  const { t } = useTranslation();
  const form = useAppForm({ schema: confirmWithPasswordSchema, defaultValues: { password: '' } });
  return (
    <Form form={form} label={t('confirmYou.title')} onSubmit={(values) => prove(values)}>
      <TextField
        control={form.control}
        name="password"
        label={t('fields.password')}
        type="password"
        autoComplete="current-password"
      />
      <Buttons isBusy={form.formState.isSubmitting} />
    </Form>
  );
}

function ByCode() {
  const { t } = useTranslation();
  const form = useAppForm({ schema: confirmWithCodeSchema, defaultValues: { code: '' } });
  return (
    <Form form={form} label={t('confirmYou.title')} onSubmit={(values) => prove(values)}>
      <CodeField control={form.control} name="code" />
      <Buttons isBusy={form.formState.isSubmitting} />
    </Form>
  );
}

function Buttons({ isBusy }: { isBusy: boolean }) {
  const { t } = useTranslation();
  return (
    <div className={styles.buttons}>
      <Button type="submit" size="3" loading={isBusy}>
        {t('confirmYou.confirm')}
      </Button>
      <Dialog.Close>
        <Button type="button" variant="soft" color="gray" size="3">
          {t('notNow')}
        </Button>
      </Dialog.Close>
    </div>
  );
}

async function prove(values: Parameters<typeof postConfirm>[0]): Promise<void> {
  await postConfirm(values);
  confirmGate.answer(true);
}

function focusFirstField(event: Event): void {
  const content = event.currentTarget;
  const field = content instanceof HTMLElement ? content.querySelector<HTMLInputElement>('input') : null;
  if (field === null) return;
  event.preventDefault();
  field.focus();
}
