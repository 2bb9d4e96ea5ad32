import { useTranslation } from 'react-i18next';

/** Words for something a step still needs. What the payment provider asks for has no words of ours: its own are shown. */
export function useMissingWords(): (item: string) => string {
  const { t, i18n } = useTranslation('company');
  return (item) =>
    i18n.exists(`company:missing.${item}`) ? t(`missing.${item}`) : item.replaceAll(/[_.]/g, ' ');
}
