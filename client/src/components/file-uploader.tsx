import { acceptedFileTypes, fileLimits, type FileKind, type FileView } from '@kerfyard/common/files';
import { Button, Text } from '@radix-ui/themes';
import { useId, useRef, useState, type DragEvent } from 'react';
import { useTranslation } from 'react-i18next';
import { useErrorWords } from '../lib/error-words.ts';
import { formatBytes, formatPercent } from '../lib/format.ts';
import { useAnnounce } from './announcer.tsx';
import styles from './file-uploader.module.css';
import { useUploads, type UploadItem } from './use-uploads.ts';

interface FileUploaderProps {
  kind: FileKind;
  /** "Photos of the place", "Drawings". */
  label: string;
  hint?: string;
  /** Called for each file that has arrived; the parent shows it. */
  onUploaded: (file: FileView) => void;
  /** Files that may still be added. */
  room?: number;
  disabled?: boolean;
  /** One button with the label as its words, for a place beside other fields. */
  compact?: boolean;
}

const accepts: Record<FileKind, string> = {
  photo: 'image/jpeg,image/png,image/webp',
  drawing: Object.keys(acceptedFileTypes).join(','),
  document: Object.keys(acceptedFileTypes).join(','),
};

/** Choose or drop several files; each shows how far it is, why it was refused, or a way to try again. */
export function FileUploader(props: FileUploaderProps) {
  const { kind, label, hint, onUploaded, room = fileLimits.maxFilesPerScope, disabled = false } = props;
  const { compact = false } = props;
  const { t } = useTranslation();
  const announce = useAnnounce();
  const id = useId();
  const input = useRef<HTMLInputElement>(null);
  const [over, setOver] = useState(false);
  const uploads = useUploads(kind, (file) => {
    announce(t('upload.arrived', { name: file.name }));
    onUploaded(file);
  });
  const add = (files: FileList | null) => {
    if (files === null || disabled) return;
    uploads.add([...files].slice(0, Math.max(0, room)));
    if (files.length > room) announce(t('upload.noRoom', { count: room }), { urgent: true });
  };
  const drop = (event: DragEvent) => {
    event.preventDefault();
    setOver(false);
    add(event.dataTransfer.files);
  };
  return (
    <div className={styles.uploader}>
      <div
        className={`${compact ? styles.compact : styles.zone} ${over ? styles.over : ''}`}
        onDragOver={(event) => {
          event.preventDefault();
          setOver(true);
        }}
        onDragLeave={() => setOver(false)}
        onDrop={drop}
      >
        <div className={compact ? 'k-hidden' : ''}>
          <Text as="div" size="2" weight="medium" id={`${id}-label`}>
            {label}
          </Text>
          <Text as="div" size="1" color="gray" id={`${id}-hint`}>
            {hint ?? t(`upload.hint.${kind}`, { size: formatBytes(fileLimits.maxBytes) })}
          </Text>
        </div>
        <input
          ref={input}
          type="file"
          className="k-hidden"
          tabIndex={-1}
          multiple
          accept={accepts[kind]}
          aria-labelledby={`${id}-label`}
          aria-describedby={`${id}-hint`}
          disabled={disabled}
          onChange={(event) => {
            add(event.target.files);
            // The same file may be chosen again after it was taken out.
            event.target.value = '';
          }}
        />
        <Button
          type="button"
          variant="soft"
          size="3"
          disabled={disabled || room <= 0}
          aria-describedby={compact ? `${id}-hint` : `${id}-label ${id}-hint`}
          onClick={() => input.current?.click()}
        >
          {compact ? label : t('upload.choose')}
        </Button>
      </div>
      {uploads.items.length > 0 && (
        <ul className={styles.items}>
          {uploads.items.map((item) => (
            <UploadRow key={item.id} item={item} onRetry={uploads.retry} onRemove={uploads.remove} />
          ))}
        </ul>
      )}
    </div>
  );
}

interface UploadRowProps {
  item: UploadItem;
  onRetry: (item: UploadItem) => void;
  onRemove: (item: UploadItem) => void;
}

function UploadRow({ item, onRetry, onRemove }: UploadRowProps) {
  const { t } = useTranslation();
  const reason = useReason(item);
  return (
    <li className={styles.item}>
      <div className={styles.what}>
        <span className={styles.name}>{item.file.name}</span>
        <span className={styles.size}>{formatBytes(item.file.size)}</span>
      </div>
      {reason === null ? (
        <progress
          className={styles.bar}
          value={item.share}
          max={1}
          aria-label={t('upload.progress', { name: item.file.name, share: formatPercent(item.share) })}
        />
      ) : (
        <span className={styles.reason} role="alert">
          {reason}
        </span>
      )}
      <div className={styles.buttons}>
        {item.problem?.kind === 'failed' && (
          <Button type="button" size="2" variant="soft" onClick={() => onRetry(item)}>
            {t('tryAgain')}
          </Button>
        )}
        <Button
          type="button"
          size="2"
          variant="ghost"
          color="gray"
          aria-label={t('upload.takeOut', { name: item.file.name })}
          onClick={() => onRemove(item)}
        >
          {item.problem === null ? t('cancel') : t('upload.dismiss')}
        </Button>
      </div>
    </li>
  );
}

function useReason(item: UploadItem): string | null {
  const { t } = useTranslation();
  const words = useErrorWords();
  if (item.problem === null) return null;
  if (item.problem.kind === 'failed') return words(item.problem.error).what;
  if (item.problem.message !== '') return item.problem.message;
  return t(`upload.refused.${item.problem.code}`, { size: formatBytes(fileLimits.maxBytes) });
}
