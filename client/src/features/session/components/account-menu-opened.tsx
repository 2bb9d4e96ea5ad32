import type { MeView } from '@kerfyard/common/people';
import { DropdownMenu } from '@radix-ui/themes';
import { useTranslation } from 'react-i18next';
import { useNavigate } from 'react-router-dom';
import { changeLocale, chosenLocale, locales } from '../../../lib/i18n.ts';
import { paths } from '../../../lib/paths.ts';
import { themeChoices, useTheme } from '../../../lib/theme.ts';
import { useSignOut } from '../hooks/use-session.ts';
import { AccountButton } from './account-button.tsx';

/** The menu behind the button, open as soon as it is here. */
export default function AccountMenuOpened({ me }: { me: MeView }) {
  const { t } = useTranslation();
  const [theme, chooseTheme] = useTheme();
  const signOut = useSignOut();
  const navigate = useNavigate();
  return (
    <DropdownMenu.Root defaultOpen modal={false}>
      <DropdownMenu.Trigger>
        <AccountButton me={me} />
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
        <DropdownMenu.RadioGroup value={chosenLocale()} onValueChange={chooseLocale}>
          {(['en', 'es'] as const).map((locale) => (
            <DropdownMenu.RadioItem key={locale} value={locale} lang={locale}>
              {t(`language.${locale}`)}
            </DropdownMenu.RadioItem>
          ))}
        </DropdownMenu.RadioGroup>
        <DropdownMenu.Separator />
        <DropdownMenu.Item onSelect={() => void navigate(paths.account)}>
          {t('account.own')}
        </DropdownMenu.Item>
        <DropdownMenu.Item onSelect={() => void navigate(paths.calculators)}>
          {t('calculators')}
        </DropdownMenu.Item>
        <DropdownMenu.Separator />
        <DropdownMenu.Item onSelect={() => signOut.mutate()}>{t('signOut')}</DropdownMenu.Item>
      </DropdownMenu.Content>
    </DropdownMenu.Root>
  );
}

function chooseLocale(value: string): void {
  const locale = locales.find((known) => known === value);
  if (locale !== undefined) changeLocale(locale);
}
