import { postMessageSchema, type PostMessage } from '@kerfyard/common/talk';
import { Button, Text } from '@radix-ui/themes';
import { useEffect, useState, type KeyboardEvent, type SyntheticEvent } from 'react';
import { useWatch } from 'react-hook-form';
import { useTranslation } from 'react-i18next';
import { useAnnounce } from '../../../components/announcer.tsx';
import { FileThumbs } from '../../../components/file-thumb.tsx';
import { FileUploader } from '../../../components/file-uploader.tsx';
import { TextField } from '../../../components/form/fields.tsx';
import { Form } from '../../../components/form/form.tsx';
import { isApiError } from '../../../lib/api-error.ts';
import { useAppForm } from '../../../lib/app-form.ts';
import { useFormId } from '../../../lib/use-form-id.ts';
import { keepDraft, readDraft } from '../message-draft.ts';
import styles from './talk.module.css';

const MAX_PHOTOS = 10;

interface MessageFormProps {
  /** Under which the unsent words are kept in this tab. */
  draftKey: string;
  /** To whom: names the field. */
  to: string;
  onSend: (message: PostMessage) => Promise<unknown>;
  /** The words of an earlier try turned out to have arrived. */
  onEarlierArrived?: () => void;
}

/** Words and photos to the other side. What is typed survives a reload; a send that got no answer may be repeated. */
export function MessageForm({ draftKey, to, onSend, onEarlierArrived }: MessageFormProps) {
  const { t } = useTranslation('talk');
  const announce = useAnnounce();
  const [kept] = useState(() => readDraft(draftKey));
  const { id, renew } = useFormId(kept.id);
  const [files, setFiles] = useState(kept.files);
  const [hasArrived, setHasArrived] = useState(false);
  const form = useAppForm({
    schema: postMessageSchema,
    defaultValues: { id, body: kept.body, fileIds: kept.files.map((file) => file.id) },
  });
  const body = useWatch({ control: form.control, name: 'body' }) ?? '';
  useEffect(() => keepDraft(draftKey, { id, body, files }), [draftKey, id, body, files]);

  useEffect(() => {
    form.setValue(
      'fileIds',
      files.map((file) => file.id),
    );
    if (files.length > 0) form.clearErrors('body');
  }, [form, files]);

  const { isSubmitting } = form.formState;
  const send = async (message: PostMessage) => {
    setHasArrived(false);
    try {
      await onSend({ ...message, id });
    } catch (error) {
      if (!isApiError(error, 'key_reused')) throw error;
      renew();
      setHasArrived(true);
      onEarlierArrived?.();
      return;
    }
    keepDraft(draftKey, { id: undefined, body: '', files: [] });
    renew();
    setFiles([]);
    form.reset({ id, body: '', fileIds: [] });
    announce(t('sent'));
  };
  return (
    // Not a disabled button while sending: it would lose the focus.
    <div
      className={styles.write}
      onKeyDown={sendByKey}
      onSubmitCapture={(event) => isSubmitting && stop(event)}
    >
      <Form form={form} onSubmit={send} label={t('form', { name: to })}>
        {hasArrived && (
          <Text as="p" size="2" role="status">
            {t('earlierArrived')}
          </Text>
        )}
        <TextField
          control={form.control}
          name="body"
          label={t('message', { name: to })}
          lines={2}
          maxLength={4000}
        />
        <FileThumbs
          files={files}
          onRemove={(file) => setFiles((before) => before.filter((one) => one.id !== file.id))}
        />
        <div className={styles.send}>
          <Button type="submit" size="3" aria-disabled={isSubmitting}>
            {t(isSubmitting ? 'sending' : 'send')}
          </Button>
          <FileUploader
            kind="photo"
            label={t('addPhotos')}
            compact
            room={MAX_PHOTOS - files.length}
            onUploaded={(file) => setFiles((before) => [...before, file])}
          />
        </div>
      </Form>
    </div>
  );
}

/** Ctrl+Enter or Cmd+Enter sends; Enter alone is a new line, as on a phone. */
function sendByKey(event: KeyboardEvent<HTMLElement>): void {
  if (event.key !== 'Enter' || !(event.ctrlKey || event.metaKey)) return;
  if (!(event.target instanceof HTMLTextAreaElement)) return;
  event.preventDefault();
  event.target.form?.requestSubmit();
}

function stop(event: SyntheticEvent): void {
  event.preventDefault();
  event.stopPropagation();
}
