import { changeEmailSchema, type AccountView } from '@kerfyard/common/people';
import { Button, Text } from '@radix-ui/themes';
import { useTranslation } from 'react-i18next';
import { useAnnounce } from '../../../components/announcer.tsx';
import { TextField } from '../../../components/form/fields.tsx';
import { Form } from '../../../components/form/form.tsx';
import { useAppForm } from '../../../lib/app-form.ts';
import { useChangeEmail } from '../api/account.queries.ts';
import { Section } from './section.tsx';

/** A new address counts when its own link is pressed; until then the present one does. */
export function EmailForm({ account }: { account: AccountView }) {
  const { t } = useTranslation('account');
  const announce = useAnnounce();
  const change = useChangeEmail();
  const form = useAppForm({ schema: changeEmailSchema, defaultValues: { email: '' } });
  return (
    <Section title={t('email.title')} text={t('email.text', { email: account.email })}>
      {account.pendingEmail !== null && (
        <Text as="p" size="2" mb="3" role="status">
          {t('email.pending', { email: account.pendingEmail })}
        </Text>
      )}
      <Form
        form={form}
        label={t('email.title')}
        onSubmit={async (values) => {
          await change.mutateAsync(values);
          form.reset({ email: '' });
          announce(t('email.pending', { email: values.email }));
        }}
      >
        <TextField
          control={form.control}
          name="email"
          label={t('email.new')}
          type="email"
          inputMode="email"
          autoComplete="email"
        />
        <div>
          <Button type="submit" size="3" variant="soft" loading={form.formState.isSubmitting}>
            {t('email.save')}
          </Button>
        </div>
      </Form>
    </Section>
  );
}
