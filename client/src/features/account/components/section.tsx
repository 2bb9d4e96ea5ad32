import { Heading, Text } from '@radix-ui/themes';
import { useId, type ReactNode } from 'react';
import styles from './account.module.css';

/** One part of the account page: its heading, what it is for, and its state on the right. */
export function Section(props: { title: string; text?: string; state?: ReactNode; children: ReactNode }) {
  const id = useId();
  return (
    <section className="k-panel" aria-labelledby={id}>
      <div className={styles.between}>
        <Heading as="h2" size="4" weight="medium" id={id}>
          {props.title}
        </Heading>
        {props.state}
      </div>
      {props.text !== undefined && (
        <Text as="p" size="2" color="gray" mt="1" mb="3">
          {props.text}
        </Text>
      )}
      {props.children}
    </section>
  );
}
