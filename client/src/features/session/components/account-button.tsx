import type { MeView } from '@kerfyard/common/people';
import { Button } from '@radix-ui/themes';
import type { ComponentProps } from 'react';
import { useTranslation } from 'react-i18next';
import styles from './account-menu.module.css';

/** The person's initials, and at the desk the name and the company. */
export function AccountButton({ me, ...rest }: ComponentProps<typeof Button> & { me: MeView }) {
  const { t } = useTranslation();
  return (
    <Button
      {...rest}
      variant="ghost"
      color="gray"
      className={styles.trigger}
      aria-label={t('account.menu', { name: me.user.name })}
    >
      <span className={styles.initials} aria-hidden="true">
        {initials(me.user.name)}
      </span>
      <span className={styles.who}>
        <span className={styles.name}>{me.user.name}</span>
        {me.company !== null && <span className={styles.company}>{me.company.name}</span>}
      </span>
    </Button>
  );
}

function initials(name: string): string {
  const words = name.split(/\s+/).filter((word) => word !== '');
  return [words[0], words.length > 1 ? words.at(-1) : undefined]
    .map((word) => word?.charAt(0).toUpperCase() ?? '')
    .join('');
}
