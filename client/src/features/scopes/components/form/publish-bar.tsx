import { Button } from '@radix-ui/themes';
import { useTranslation } from 'react-i18next';
import { ConfirmDialog } from '../../../../components/confirm-dialog.tsx';
import { formatDateTime } from '../../../../lib/format.ts';
import type { SaveState } from '../../draft-saver.ts';
import { SavedWords } from './saved-words.tsx';
import styles from './scope-form.module.css';

interface PublishBarProps {
  state: SaveState;
  mayPublish: boolean;
  due: { at: string | null; timeZone: string; mode: string };
  /** Whether everything is there; if not, the form shows what is missing. */
  mayAsk: () => boolean;
  onPublish: () => Promise<unknown>;
}

/** At the foot of the form, always in sight: what is saved, and the one big step. */
export function PublishBar(props: PublishBarProps) {
  const { state, mayPublish, due, mayAsk, onPublish } = props;
  const { t } = useTranslation(['scopes', 'scope']);
  return (
    <div className={styles.bar}>
      <SavedWords state={state} />
      <ConfirmDialog
        trigger={
          <Button type="button" size="3" disabled={!mayPublish}>
            {t('publish.button')}
          </Button>
        }
        title={t('publish.title')}
        text={t('publish.text')}
        confirm={t('publish.confirm')}
        disabled={state.kind === 'conflict'}
        mayOpen={mayAsk}
        onConfirm={onPublish}
      >
        <ul className={styles.facts}>
          <li>{t('publish.public')}</li>
          <li>{t('publish.held')}</li>
          <li>{t('publish.fixed')}</li>
          {due.at !== null && (
            <li>
              {t(`publish.${due.mode === 'ranked' ? 'ranked' : 'sealed'}`, {
                due: formatDateTime(due.at, due.timeZone),
              })}
            </li>
          )}
        </ul>
      </ConfirmDialog>
    </div>
  );
}
