import { useTranslation } from 'react-i18next';
import { isApiError } from './api-error.ts';

export interface ErrorWords {
  what: string;
  next: string | undefined;
  requestId: string | null;
  /** Whether trying the same again may help. */
  retry: boolean;
}

/** Words for any error: the catalogue's sentence under the error's code, the server's own sentence failing that. */
export function useErrorWords(): (error: unknown) => ErrorWords {
  const { t, i18n } = useTranslation();
  return (error) => {
    if (!isApiError(error)) {
      return {
        what: t('errors.internal.what'),
        next: t('errors.internal.next'),
        requestId: null,
        retry: true,
      };
    }
    const key = `errors.${error.code}`;
    const known = (part: string) => (i18n.exists(`${key}.${part}`) ? t(`${key}.${part}`) : undefined);
    return {
      what: known('what') ?? (error.message === '' ? t('errors.internal.what') : error.message),
      next: known('next'),
      requestId: error.status >= 500 ? error.requestId : null,
      retry: error.status === 0 || error.status >= 500 || error.status === 429,
    };
  };
}
