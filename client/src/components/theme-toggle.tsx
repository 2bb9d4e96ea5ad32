import { IconButton } from '@radix-ui/themes';
import { useTranslation } from 'react-i18next';
import { themeChoices, useTheme, type ThemeChoice } from '../lib/theme.ts';

const pictures: Record<ThemeChoice, string> = {
  system: 'M12 4a8 8 0 1 0 0 16zM12 4a8 8 0 0 1 0 16',
  light:
    'M12 7a5 5 0 1 0 0 10 5 5 0 0 0 0-10M12 1.5v3M12 19.5v3M1.5 12h3M19.5 12h3M4.6 4.6l2.1 2.1M17.3 17.3l2.1 2.1M19.4 4.6l-2.1 2.1M6.7 17.3l-2.1 2.1',
  dark: 'M20 14.2A8.3 8.3 0 0 1 9.8 4a8.3 8.3 0 1 0 10.2 10.2z',
};

/** One press goes on to the next of system, light, dark; the button says which one holds. */
export function ThemeToggle() {
  const { t } = useTranslation();
  const [choice, choose] = useTheme();
  const next = themeChoices[(themeChoices.indexOf(choice) + 1) % themeChoices.length] ?? 'system';
  return (
    <IconButton
      variant="ghost"
      color="gray"
      size="3"
      onClick={() => choose(next)}
      aria-label={t('theme.label', { now: t(`theme.${choice}`), next: t(`theme.${next}`) })}
      title={t(`theme.${choice}`)}
    >
      <svg width="20" height="20" viewBox="0 0 24 24" aria-hidden="true" focusable="false">
        <path
          d={pictures[choice]}
          fill={choice === 'dark' ? 'currentColor' : 'none'}
          stroke="currentColor"
          strokeWidth="1.8"
          strokeLinecap="round"
        />
        {choice === 'system' && <path d="M12 4a8 8 0 0 0 0 16z" fill="currentColor" />}
      </svg>
    </IconButton>
  );
}
