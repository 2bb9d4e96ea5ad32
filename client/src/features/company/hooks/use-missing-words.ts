import { useTranslation } from 'react-i18next';

/**
 * Words for what a step still needs, each once. The payment provider names its own by dotted paths
 * (`tos_acceptance.date`): the first part has words here, and one that has none is shown as it is.
 */
export function useMissingWords(): (items: readonly string[]) => string[] {
  const { t, i18n } = useTranslation('company');
  const words = (item: string) => {
    const key = item.split('.')[0] ?? item;
    return i18n.exists(`company:missing.${key}`) ? t(`missing.${key}`) : item.replaceAll(/[_.]/g, ' ');
  };
  return (items) => [...new Set(items.map(words))];
}
