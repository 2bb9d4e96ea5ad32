import { Heading, Text } from '@radix-ui/themes';
import { useEffect, useRef, type ReactNode } from 'react';
import { useLocation } from 'react-router-dom';
import styles from './page.module.css';

interface PageProps {
  /** The one h1 and the document's title. */
  title: string;
  /** One quiet line under the title. */
  lead?: ReactNode;
  /** What stands right of the title: the page's main buttons. */
  actions?: ReactNode;
  /** `narrow` for forms and reading, `wide` for tables. */
  width?: 'narrow' | 'normal' | 'wide';
  /** Larger targets for gloves. */
  field?: boolean;
  children: ReactNode;
}

/** One page: sets the title, has the h1, and moves the focus to it when the address changed, so that it is read. */
export function Page({ title, lead, actions, width = 'normal', field = false, children }: PageProps) {
  const heading = useRef<HTMLHeadingElement>(null);
  const { pathname } = useLocation();
  useEffect(() => {
    document.title = `${title} · Kerfyard`;
  }, [title]);
  useFocusOnArrival(heading, pathname);
  return (
    <div className={`${styles.page} ${styles[width]} ${field ? 'k-field' : ''}`}>
      <header className={styles.head}>
        <div className={styles.words}>
          <Heading as="h1" size="7" weight="medium" ref={heading} tabIndex={-1} className={styles.title}>
            {title}
          </Heading>
          {lead !== undefined && (
            <Text as="div" size="3" color="gray" className={styles.lead}>
              {lead}
            </Text>
          )}
        </div>
        {actions !== undefined && <div className={styles.actions}>{actions}</div>}
      </header>
      {children}
    </div>
  );
}

let arrivedAt: string | null = null;

/** Not on the first page of a visit: there the browser's own start of reading is right. */
function useFocusOnArrival(heading: React.RefObject<HTMLHeadingElement | null>, pathname: string): void {
  useEffect(() => {
    if (arrivedAt !== null && arrivedAt !== pathname && !isTyping()) {
      heading.current?.focus({ preventScroll: true });
    }
    arrivedAt = pathname;
  }, [heading, pathname]);
}

function isTyping(): boolean {
  return document.activeElement?.matches('input, textarea, select, [contenteditable="true"]') ?? false;
}
