import type { MessageView } from '@kerfyard/common/talk';
import { Text } from '@radix-ui/themes';
import { useTranslation } from 'react-i18next';
import { FileThumbs } from '../../../components/file-thumb.tsx';
import { StatusWord } from '../../../components/status-word.tsx';
import { deviceTimeZone } from '../../../lib/clock.ts';
import { formatDateTime } from '../../../lib/format.ts';
import styles from './talk.module.css';

interface MessageListProps {
  /** The newest first. */
  messages: readonly MessageView[];
  otherSideId: string;
  /** Messages of the other side after this one are marked as new. */
  seenSeq: number;
}

/** A log book: the last entry on top, each with who, when, words and photos. */
export function MessageList({ messages, otherSideId, seenSeq }: MessageListProps) {
  const { t } = useTranslation('talk');
  return (
    <ol className={styles.messages} aria-label={t('messages')} reversed>
      {messages.map((message) => {
        const isTheirs = message.company.id === otherSideId;
        return (
          <li key={message.id} className={`${styles.message} ${isTheirs ? styles.theirs : ''}`}>
            <div className={styles.head}>
              <Text size="2" weight="medium">
                {message.isOwn ? t('you') : message.author.name}
                {!message.isOwn && <span className={styles.soft}>, {message.company.name}</span>}
              </Text>
              {isTheirs && message.seq > seenSeq && <StatusWord tone="open">{t('new')}</StatusWord>}
              <Text size="1" color="gray" asChild>
                <time dateTime={message.sentAt}>{formatDateTime(message.sentAt, deviceTimeZone())}</time>
              </Text>
            </div>
            {message.body !== '' && (
              <Text as="p" size="3" className={styles.body}>
                {message.body}
              </Text>
            )}
            <FileThumbs files={message.files} />
          </li>
        );
      })}
    </ol>
  );
}
