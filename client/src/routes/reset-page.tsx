import { askResetSchema, resetPasswordSchema } from '@kerfyard/common/people';
import { Button, Text } from '@radix-ui/themes';
import { useState } from 'react';
import { useTranslation } from 'react-i18next';
import { useSearchParams } from 'react-router-dom';
import { TextField } from '../components/form/fields.tsx';
import { Form } from '../components/form/form.tsx';
import { ButtonLink, TextLink } from '../components/link.tsx';
import { Page } from '../components/page.tsx';
import { postAskReset, postReset } from '../features/account/api/account.queries.ts';
import { useAppForm } from '../lib/app-form.ts';
import { paths } from '../lib/paths.ts';

/** A forgotten password: asks for the link, and is where the link leads. */
export default function ResetPage() {
  const { t } = useTranslation('account');
  const token = useSearchParams()[0].get('token');
  const [step, setStep] = useState<'form' | 'sent' | 'done'>('form');
  if (step === 'sent') return <Note title={t('reset.sentTitle')} text={t('reset.sentText')} />;
  if (step === 'done') {
    return (
      <Note title={t('reset.doneTitle')} text={t('reset.doneText')}>
        <ButtonLink to={paths.signIn()} size="3">
          {t('signIn', { ns: 'shell' })}
        </ButtonLink>
      </Note>
    );
  }
  return (
    <Page title={t('reset.title')} width="narrow" lead={t(token === null ? 'reset.lead' : 'reset.newLead')}>
      <div className="k-panel" style={{ maxWidth: '26rem' }}>
        {token === null ? (
          <AskForm onSent={() => setStep('sent')} />
        ) : (
          <NewPasswordForm token={token} onDone={() => setStep('done')} />
        )}
      </div>
      <Text as="p" mt="4" color="gray">
        {token === null ? (
          <TextLink to={paths.signIn()}>{t('reset.toSignIn')}</TextLink>
        ) : (
          <TextLink to={paths.reset}>{t('reset.again')}</TextLink>
        )}
      </Text>
    </Page>
  );
}

function AskForm({ onSent }: { onSent: () => void }) {
  const { t } = useTranslation('account');
  const form = useAppForm({ schema: askResetSchema, defaultValues: { email: '' } });
  return (
    <Form
      form={form}
      label={t('reset.title')}
      onSubmit={async ({ email }) => {
        await postAskReset(email);
        onSent();
      }}
    >
      <TextField
        control={form.control}
        name="email"
        label={t('fields.email', { ns: 'shell' })}
        type="email"
        inputMode="email"
        autoComplete="username"
      />
      <div>
        <Button type="submit" size="3" loading={form.formState.isSubmitting}>
          {t('reset.send')}
        </Button>
      </div>
    </Form>
  );
}

function NewPasswordForm({ token, onDone }: { token: string; onDone: () => void }) {
  const { t } = useTranslation('account');
  const form = useAppForm({ schema: resetPasswordSchema, defaultValues: { token, password: '' } });
  return (
    <Form
      form={form}
      label={t('reset.title')}
      onSubmit={async (values) => {
        await postReset(values);
        onDone();
      }}
    >
      <TextField
        control={form.control}
        name="password"
        label={t('password.new')}
        hint={t('password.newHint')}
        type="password"
        autoComplete="new-password"
      />
      <div>
        <Button type="submit" size="3" loading={form.formState.isSubmitting}>
          {t('reset.save')}
        </Button>
      </div>
    </Form>
  );
}

function Note(props: { title: string; text: string; children?: React.ReactNode }) {
  return (
    <Page title={props.title} width="narrow">
      <div className="k-panel" role="status">
        <Text as="p" size="3" mb="3">
          {props.text}
        </Text>
        {props.children}
      </div>
    </Page>
  );
}
