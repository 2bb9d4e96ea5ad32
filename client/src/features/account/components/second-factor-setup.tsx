import { setSecondFactorSchema, type NewSecondFactorView } from '@kerfyard/common/people';
import { Button, Link, Text } from '@radix-ui/themes';
import { lazy, Suspense } from 'react';
import { useTranslation } from 'react-i18next';
import { TextField } from '../../../components/form/fields.tsx';
import { Form } from '../../../components/form/form.tsx';
import { Loading } from '../../../components/states.tsx';
import { useAppForm } from '../../../lib/app-form.ts';
import { postSecondFactorCode } from '../api/account.queries.ts';
import styles from './account.module.css';

const QrCode = lazy(() => import('./qr-code.tsx'));

/** The secret as a picture and as text for the app, then the app's first code. */
export function SecondFactorSetup(props: {
  secret: NewSecondFactorView;
  onSet: (codes: string[]) => void;
  onLeave: () => void;
}) {
  const { t } = useTranslation('account');
  const form = useAppForm({ schema: setSecondFactorSchema, defaultValues: { code: '' } });
  return (
    <div className={styles.steps}>
      <div>
        <Text as="p" size="2" mb="3">
          {t('factor.scan')}
        </Text>
        <div className={styles.qr}>
          <Suspense fallback={<Loading />}>
            <QrCode text={props.secret.address} label={t('factor.picture')} />
          </Suspense>
        </div>
        <Text as="p" size="2" mt="3">
          <Link href={props.secret.address} underline="always">
            {t('factor.openHere')}
          </Link>
        </Text>
        <Text as="p" size="2" color="gray" mt="2">
          {t('factor.orType')}
        </Text>
        <Text as="p" size="2" className={styles.secret}>
          {inFours(props.secret.secret)}
        </Text>
      </div>
      <Form
        form={form}
        label={t('factor.title')}
        onSubmit={async ({ code }) => props.onSet((await postSecondFactorCode(code)).codes)}
      >
        <TextField
          control={form.control}
          name="code"
          label={t('factor.code')}
          hint={t('factor.codeHint')}
          inputMode="numeric"
          autoComplete="one-time-code"
        />
        <div className={styles.buttons}>
          <Button type="submit" size="3" loading={form.formState.isSubmitting}>
            {t('factor.set')}
          </Button>
          <Button type="button" variant="soft" color="gray" size="3" onClick={props.onLeave}>
            {t('factor.leave')}
          </Button>
        </div>
      </Form>
    </div>
  );
}

const inFours = (secret: string) => (secret.match(/.{1,4}/g) ?? []).join(' ');
