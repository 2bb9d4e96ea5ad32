import { Button, Text } from '@radix-ui/themes';
import { useTranslation } from 'react-i18next';
import { useAnnounce } from '../../../components/announcer.tsx';
import { downloadText } from '../../../lib/download-text.ts';
import styles from './account.module.css';

/** Recovery codes, shown once: to copy, to keep as a file, and to say that they are kept. */
export function RecoveryCodes({ codes, onKept }: { codes: readonly string[]; onKept: () => void }) {
  const { t } = useTranslation('account');
  const announce = useAnnounce();
  const copy = async () => {
    await navigator.clipboard.writeText(codes.join('\n'));
    announce(t('codes.copied'));
  };
  return (
    <div role="group" aria-label={t('codes.title')}>
      <Text as="p" size="3" weight="medium">
        {t('codes.title')}
      </Text>
      <Text as="p" size="2" color="gray" mt="1">
        {t('codes.text')}
      </Text>
      <ul className={styles.codes}>
        {codes.map((code) => (
          <li key={code}>{code}</li>
        ))}
      </ul>
      <div className={styles.buttons}>
        <Button size="3" onClick={onKept}>
          {t('codes.kept')}
        </Button>
        <Button variant="soft" size="3" onClick={() => downloadText(t('codes.file'), codes.join('\r\n'))}>
          {t('codes.download')}
        </Button>
        <Button variant="soft" size="3" onClick={() => void copy().catch(() => undefined)}>
          {t('codes.copy')}
        </Button>
      </div>
    </div>
  );
}
