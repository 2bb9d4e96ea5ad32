import type { MeView } from '@kerfyard/common/people';
import { Button, DropdownMenu } from '@radix-ui/themes';
import { useTranslation } from 'react-i18next';
import { themeChoices, useTheme } from '../../../lib/theme.ts';
import { useSignOut } from '../hooks/use-session.ts';
import styles from './account-menu.module.css';

/** Who is signed in, for which company; appearance and sign-out. */
export function AccountMenu({ me }: { me: MeView }) {
  const { t } = useTranslation();
  const [theme, chooseTheme] = useTheme();
  const signOut = useSignOut();
  return (
    <DropdownMenu.Root>
      <DropdownMenu.Trigger>
        <Button
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
      </DropdownMenu.Trigger>
      <DropdownMenu.Content align="end" color="gray">
        <DropdownMenu.Label>
          {me.role === null ? t('account.staff') : t('account.role', { role: t(`roles.${me.role}`) })}
        </DropdownMenu.Label>
        <DropdownMenu.RadioGroup
          value={theme}
          onValueChange={(value) => chooseTheme(themeChoices.find((choice) => choice === value) ?? 'system')}
        >
          {themeChoices.map((choice) => (
            <DropdownMenu.RadioItem key={choice} value={choice}>
              {t(`theme.${choice}`)}
            </DropdownMenu.RadioItem>
          ))}
        </DropdownMenu.RadioGroup>
        <DropdownMenu.Separator />
        <DropdownMenu.Item onSelect={() => signOut.mutate()}>{t('signOut')}</DropdownMenu.Item>
      </DropdownMenu.Content>
    </DropdownMenu.Root>
  );
}

function initials(name: string): string {
  const words = name.split(/\s+/).filter((word) => word !== '');
  return [words[0], words.length > 1 ? words.at(-1) : undefined]
    .map((word) => word?.charAt(0).toUpperCase() ?? '')
    .join('');
}
