import { signUpSchema, type CompanyKind } from '@kerfyard/common/people';
import { Button } from '@radix-ui/themes';
import { useTranslation } from 'react-i18next';
import { RadioField } from '../../../components/form/choice-fields.tsx';
import { TextField } from '../../../components/form/fields.tsx';
import { Form } from '../../../components/form/form.tsx';
import { useAppForm } from '../../../lib/app-form.ts';
import { useFormId } from '../../../lib/use-form-id.ts';
import { postSignUp } from '../api/session.queries.ts';

/** A person and their company, in one form. */
export function SignUpForm(props: { kind: CompanyKind | undefined; onSent: (email: string) => void }) {
  const { t } = useTranslation('session');
  const { id } = useFormId();
  const form = useAppForm({
    schema: signUpSchema,
    defaultValues: {
      name: '',
      email: '',
      password: '',
      company: { kind: props.kind, name: '', phone: '' },
    },
  });
  return (
    <Form
      form={form}
      label={t('signUpPage.title')}
      onSubmit={async (values) => {
        await postSignUp(values, id);
        props.onSent(values.email);
      }}
    >
      <RadioField
        control={form.control}
        name="company.kind"
        look="cards"
        label={t('signUpPage.kind')}
        options={[
          { value: 'general_contractor', label: t('signUpPage.gc'), note: t('signUpPage.gcNote') },
          { value: 'cutting_contractor', label: t('signUpPage.crew'), note: t('signUpPage.crewNote') },
        ]}
      />
      <TextField
        control={form.control}
        name="company.name"
        label={t('fields.companyName')}
        autoComplete="organization"
      />
      <TextField
        control={form.control}
        name="company.phone"
        label={t('fields.companyPhone')}
        type="tel"
        inputMode="tel"
        autoComplete="tel"
      />
      <TextField control={form.control} name="name" label={t('fields.yourName')} autoComplete="name" />
      <TextField
        control={form.control}
        name="email"
        label={t('fields.workEmail')}
        type="email"
        inputMode="email"
        autoComplete="email"
        hint={t('fields.workEmailHint')}
      />
      <TextField
        control={form.control}
        name="password"
        label={t('fields.newPassword')}
        type="password"
        autoComplete="new-password"
        hint={t('fields.newPasswordHint')}
      />
      <div>
        <Button type="submit" size="3" loading={form.formState.isSubmitting}>
          {t('signUpPage.send')}
        </Button>
      </div>
    </Form>
  );
}
