import { signSchema, type SubcontractView } from '@kerfyard/common/subcontracts';
import { Button, Heading, Link, Text } from '@radix-ui/themes';
import { useTranslation } from 'react-i18next';
import { TextField } from '../../../components/form/fields.tsx';
import { Form } from '../../../components/form/form.tsx';
import { StatusWord } from '../../../components/status-word.tsx';
import { useAppForm } from '../../../lib/app-form.ts';
import { fileUrl } from '../../../lib/file-url.ts';
import { formatDateTime } from '../../../lib/format.ts';
import { useIsLive } from '../../../lib/live.ts';
import { useSession } from '../../session/hooks/use-session.ts';
import { useSign } from '../api/sign.mutations.ts';
import styles from './work.module.css';

/** The subcontract as a document: read it, sign it, see who signed what when. */
export function Paper({ subcontract, canSign }: { subcontract: SubcontractView; canSign: boolean }) {
  const { t } = useTranslation('work');
  const zone = subcontract.site.timeZone;
  const signed = subcontract.signatures.some((signature) => signature.side === subcontract.side);
  const mine = subcontract.status === 'awaiting_signatures' && !signed;
  const document = subcontract.signedDocument ?? subcontract.document;
  return (
    <section className={styles.section} aria-labelledby="paper">
      <Heading as="h2" size="5" weight="medium" id="paper">
        {t('paper.title')}
      </Heading>
      <div>
        <Link href={fileUrl(document.fileId, 'full')} target="_blank" rel="noreferrer" underline="always">
          {t(subcontract.signedDocument === null ? 'paper.read' : 'paper.readSigned')}
        </Link>
      </div>
      <Text as="p" color="gray" className={styles.hash}>
        {t('paper.hash', { hash: document.sha256 })}
      </Text>
      <ul className={styles.plain}>
        {(['gc', 'crew'] as const).map((side) => {
          const signature = subcontract.signatures.find((one) => one.side === side);
          const name = side === 'gc' ? subcontract.gc.name : subcontract.crew.name;
          return (
            <li key={side} className={styles.choice}>
              {signature === undefined ? (
                <StatusWord tone="waiting">{t('paper.waiting', { name })}</StatusWord>
              ) : (
                <StatusWord tone="good">
                  {t('paper.signedBy', {
                    name,
                    person: signature.typedName,
                    at: formatDateTime(signature.signedAt, zone),
                  })}
                </StatusWord>
              )}
            </li>
          );
        })}
      </ul>
      {subcontract.status === 'awaiting_signatures' && (
        <Text as="p" size="2">
          {t('paper.signBy', { at: formatDateTime(subcontract.signBy, zone) })}
        </Text>
      )}
      {mine && canSign && <SignForm subcontract={subcontract} />}
      {mine && !canSign && <Text color="gray">{t('paper.role')}</Text>}
    </section>
  );
}

function SignForm({ subcontract }: { subcontract: SubcontractView }) {
  const { t } = useTranslation('work');
  const { user } = useSession();
  const isLive = useIsLive();
  const sign = useSign(subcontract.id);
  const form = useAppForm({
    schema: signSchema,
    defaultValues: { name: '', documentSha256: subcontract.document.sha256 },
  });
  return (
    <Form form={form} label={t('paper.sign')} onSubmit={(values) => sign.mutateAsync(values)}>
      <TextField
        control={form.control}
        name="name"
        label={t('paper.name')}
        hint={t('paper.nameHint', { name: user.name })}
        autoComplete="name"
      />
      <Text as="p" size="2" color="gray">
        {t('paper.meaning')}
      </Text>
      <div>
        <Button type="submit" size="3" loading={form.formState.isSubmitting} disabled={!isLive}>
          {t('paper.sign')}
        </Button>
      </div>
    </Form>
  );
}
