import type { FileView } from '@kerfyard/common/files';
import { useTranslation } from 'react-i18next';
import { fileUrl } from '../lib/file-url.ts';
import styles from './file-thumb.module.css';

/** A photo or the first page of a drawing, small; a press opens the whole file in a new tab. */
export function FileThumb({ file, onRemove }: { file: FileView; onRemove?: () => void }) {
  const { t } = useTranslation();
  const words = file.caption === '' ? file.name : file.caption;
  return (
    <figure className={styles.thumb}>
      <a href={fileUrl(file.id, 'full')} target="_blank" rel="noreferrer" className={styles.open}>
        {file.type === 'application/pdf' ? (
          <SheetPicture pages={file.pages} />
        ) : (
          <img
            src={fileUrl(file.id, 'thumb')}
            alt={words}
            loading="lazy"
            decoding="async"
            width="160"
            height="120"
          />
        )}
        <span className="k-hidden">{t('files.open', { name: words })}</span>
      </a>
      <figcaption className={styles.caption}>
        <span className={styles.words}>{words}</span>
        {onRemove !== undefined && (
          <button
            type="button"
            className={styles.remove}
            aria-label={t('files.remove', { name: words })}
            onClick={onRemove}
          >
            <svg width="12" height="12" viewBox="0 0 12 12" aria-hidden="true" focusable="false">
              <path d="m2 2 8 8M10 2l-8 8" stroke="currentColor" strokeWidth="1.6" />
            </svg>
          </button>
        )}
      </figcaption>
    </figure>
  );
}

/** Several side by side. */
export function FileThumbs({
  files,
  onRemove,
}: {
  files: readonly FileView[];
  onRemove?: (file: FileView) => void;
}) {
  if (files.length === 0) return null;
  return (
    <ul className={styles.thumbs}>
      {files.map((file) => (
        <li key={file.id}>
          <FileThumb file={file} {...(onRemove === undefined ? {} : { onRemove: () => onRemove(file) })} />
        </li>
      ))}
    </ul>
  );
}

/** A drawing's sheet stands for a PDF: its outline, its title block and how many pages it has. */
function SheetPicture({ pages }: { pages: number | null }) {
  const { t } = useTranslation();
  return (
    <span className={styles.sheet}>
      <svg viewBox="0 0 160 120" aria-hidden="true" focusable="false">
        <rect x="14" y="12" width="132" height="96" />
        <path d="M104 108V86h42M30 30h56v36H30zM44 22v52M72 22v52M22 40h72M22 58h72" />
      </svg>
      <span className={styles.pages}>{t('files.sheets', { count: pages ?? 1 })}</span>
    </span>
  );
}
