import { Button, Heading, Text } from '@radix-ui/themes';
import type { ReactNode } from 'react';
import { useTranslation } from 'react-i18next';
import { useErrorWords } from '../lib/error-words.ts';
import styles from './states.module.css';

/** An empty page teaches: the drawing it will hold, what comes here, and what to do first. */
export function EmptyState(props: {
  drawing?: ReactNode;
  title: string;
  text?: ReactNode;
  action?: ReactNode;
}) {
  return (
    <section className={styles.state}>
      {props.drawing !== undefined && <div className={styles.drawing}>{props.drawing}</div>}
      <Heading as="h2" size="4" weight="medium">
        {props.title}
      </Heading>
      {props.text !== undefined && (
        <Text as="p" size="3" color="gray" className={styles.text}>
          {props.text}
        </Text>
      )}
      {props.action !== undefined && <div className={styles.action}>{props.action}</div>}
    </section>
  );
}

/** An error in three parts: what happened, what was kept, what to do. */
export function ErrorState(props: {
  what: string;
  kept?: string | undefined;
  next?: string | undefined;
  requestId?: string | null | undefined;
  action?: ReactNode;
}) {
  const { t } = useTranslation();
  return (
    <section className={styles.state} role="alert">
      <Text as="p" size="4" weight="medium">
        {props.what}
      </Text>
      {props.kept !== undefined && (
        <Text as="p" size="3" className={styles.text}>
          {props.kept}
        </Text>
      )}
      {props.next !== undefined && (
        <Text as="p" size="3" color="gray" className={styles.text}>
          {props.next}
        </Text>
      )}
      {props.action !== undefined && <div className={styles.action}>{props.action}</div>}
      {typeof props.requestId === 'string' && (
        <Text as="p" size="1" color="gray">
          {t('requestId', { id: props.requestId })}
        </Text>
      )}
    </section>
  );
}

/** The error state of a query, with the words of its code and a retry where one may help. */
export function QueryErrorState({ error, onRetry }: { error: unknown; onRetry?: () => void }) {
  const { t } = useTranslation();
  const words = useErrorWords()(error);
  const mayHelp = onRetry !== undefined && words.retry;
  return (
    <ErrorState
      what={words.what}
      next={words.next}
      requestId={words.requestId}
      action={
        mayHelp ? (
          <Button variant="soft" onClick={onRetry}>
            {t('tryAgain')}
          </Button>
        ) : undefined
      }
    />
  );
}

/** Loading, said in words; with `done` and `of` a bar and its counts. */
export function Loading({ what, done, of }: { what?: string; done?: number; of?: number }) {
  const { t } = useTranslation();
  const label = what ?? t('loading');
  if (done === undefined || of === undefined || of === 0) {
    return (
      <div className={styles.loading} role="status">
        <Text color="gray">{label}</Text>
      </div>
    );
  }
  return (
    <div className={styles.loading} role="status">
      <Text color="gray">{t('progress', { what: label, done, of })}</Text>
      <progress className={styles.bar} value={done} max={of} aria-label={label} />
    </div>
  );
}
