import { Heading, Text } from '@radix-ui/themes';
import { useId, type ReactNode } from 'react';
import styles from './scope-form.module.css';

/** One part of the form under its heading. */
export function FormSection(props: { title: string; lead?: ReactNode; children: ReactNode }) {
  const id = useId();
  return (
    <section className={styles.section} aria-labelledby={id}>
      <div>
        <Heading as="h2" size="5" weight="medium" id={id}>
          {props.title}
        </Heading>
        {props.lead !== undefined && (
          <Text as="p" size="2" color="gray" className={styles.lead}>
            {props.lead}
          </Text>
        )}
      </div>
      {props.children}
    </section>
  );
}
