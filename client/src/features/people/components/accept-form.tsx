import { acceptInvitationSchema } from '@kerfyard/common/people';
import { Button } from '@radix-ui/themes';
import { useTranslation } from 'react-i18next';
import { TextField } from '../../../components/form/fields.tsx';
import { Form } from '../../../components/form/form.tsx';
import { useAppForm } from '../../../lib/app-form.ts';
import { postAccept } from '../api/people.queries.ts';

/** Name and password of whoever takes the invitation up; the address is the one it was sent to. */
export function AcceptForm(props: { token: string; email: string; onAccepted: () => void }) {
  const { t } = useTranslation('people');
  const form = useAppForm({
    schema: acceptInvitationSchema,
    defaultValues: { token: props.token, name: '', password: '' },
  });
  return (
    <Form
      form={form}
      label={t('accept.title')}
      onSubmit={async (values) => {
        await postAccept(values);
        props.onAccepted();
      }}
    >
      <input
        type="text"
        name="username"
        className="k-hidden"
        autoComplete="username"
        value={props.email}
        readOnly
        tabIndex={-1}
        aria-hidden="true"
      />
      <TextField control={form.control} name="name" label={t('accept.name')} autoComplete="name" />
      <TextField
        control={form.control}
        name="password"
        label={t('accept.password')}
        hint={t('accept.passwordHint')}
        type="password"
        autoComplete="new-password"
      />
      <div>
        <Button type="submit" size="3" loading={form.formState.isSubmitting}>
          {t('accept.press')}
        </Button>
      </div>
    </Form>
  );
}
