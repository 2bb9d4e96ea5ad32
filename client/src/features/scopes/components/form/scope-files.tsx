import { fileLimits, type FileView } from '@kerfyard/common/files';
import { Button, Text } from '@radix-ui/themes';
import { memo, useId, useState } from 'react';
import { useTranslation } from 'react-i18next';
import { FileThumb } from '../../../../components/file-thumb.tsx';
import { FileUploader } from '../../../../components/file-uploader.tsx';
import formStyles from '../../../../components/form/form.module.css';
import { useErrorWords } from '../../../../lib/error-words.ts';
import { useAttachFile, useDetachFile } from '../../api/scope.mutations.ts';
import styles from './scope-form.module.css';

/** Photos and drawings of a draft, each with a caption. */
export const ScopeFiles = memo(function ScopeFiles(props: { scopeId: string; files: readonly FileView[] }) {
  const { scopeId, files } = props;
  const { t } = useTranslation('scopes');
  const attach = useAttachFile(scopeId);
  const detach = useDetachFile(scopeId);
  const words = useErrorWords();
  const [unattached, setUnattached] = useState<{ file: FileView; error: unknown }[]>([]);
  const room = fileLimits.maxFilesPerScope - files.length;
  const add = (file: FileView) => {
    setUnattached((known) => known.filter((one) => one.file.id !== file.id));
    attach
      .mutateAsync({ fileId: file.id, caption: '' })
      .catch((error: unknown) => setUnattached((known) => [...known, { file, error }]));
  };
  return (
    <>
      <div className={styles.pair}>
        <FileUploader kind="photo" label={t('files.photos')} room={room} onUploaded={add} />
        <FileUploader kind="drawing" label={t('files.drawings')} room={room} onUploaded={add} />
      </div>
      {unattached.map(({ file, error }) => (
        <div key={file.id} className={styles.position} role="alert">
          <Text size="2" color="red">
            {t('files.notAttached', { name: file.name })} {words(error).what}
          </Text>
          <Button type="button" variant="soft" onClick={() => add(file)}>
            {t('shell:tryAgain')}
          </Button>
        </div>
      ))}
      {detach.isError && (
        <Text as="p" size="2" color="red" role="alert">
          {words(detach.error).what}
        </Text>
      )}
      {files.length > 0 && (
        <ul className={styles.files}>
          {files.map((file) => (
            <li key={file.id}>
              <FileThumb file={file} onRemove={() => detach.mutate(file.id)} />
              <Caption scopeId={scopeId} file={file} />
            </li>
          ))}
        </ul>
      )}
    </>
  );
});

/** Saved when it is left. */
function Caption({ scopeId, file }: { scopeId: string; file: FileView }) {
  const { t } = useTranslation('scopes');
  const attach = useAttachFile(scopeId);
  const words = useErrorWords();
  const [text, setText] = useState(file.caption);
  const id = useId();
  const save = () => {
    const caption = text.trim();
    if (caption !== file.caption) attach.mutate({ fileId: file.id, caption });
  };
  return (
    <>
      <input
        id={id}
        className={formStyles.control}
        aria-label={t('files.captionOf', { name: file.name })}
        placeholder={t('files.caption')}
        maxLength={200}
        value={text}
        onChange={(event) => setText(event.target.value)}
        onBlur={save}
        onKeyDown={(event) => {
          if (event.key !== 'Enter') return;
          event.preventDefault();
          save();
        }}
      />
      {attach.isError && (
        <Text as="p" size="1" color="red" role="alert">
          {words(attach.error).what}
        </Text>
      )}
    </>
  );
}
