import { Text } from '@radix-ui/themes';
import { useEffect, useState } from 'react';
import { useTranslation } from 'react-i18next';
import { deviceMs } from '../../../../lib/clock.ts';
import { useErrorWords } from '../../../../lib/error-words.ts';
import type { SaveState } from '../../draft-saver.ts';

/** Where the draft stands: "Saved 2 s ago", "Saving …", or why not. */
export function SavedWords({ state }: { state: SaveState }) {
  const { t } = useTranslation('scopes');
  const words = useErrorWords();
  const seconds = useSecondsSince(state.kind === 'saved' ? state.at : null);
  const isBad = state.kind === 'failed' || state.kind === 'conflict';
  const text =
    state.kind === 'saved'
      ? seconds === null
        ? t('saved.still')
        : savedAgo(seconds, t)
      : state.kind === 'failed'
        ? `${words(state.error).what} ${t('saved.kept')}`
        : t(`saved.${state.kind}`);
  return (
    // Read out only when something is wrong: a counting clock would never be silent.
    <Text size="2" color={isBad ? 'red' : 'gray'} role={isBad ? 'alert' : undefined}>
      {text}
    </Text>
  );
}

function savedAgo(seconds: number, t: (key: string, values: Record<string, number>) => string): string {
  if (seconds < 60) return t('saved.seconds', { seconds });
  return t('saved.minutes', { minutes: Math.floor(seconds / 60) });
}

function useSecondsSince(at: number | null): number | null {
  const [now, setNow] = useState(deviceMs);
  useEffect(() => {
    if (at === null) return undefined;
    const timer = setInterval(() => setNow(deviceMs()), 1000);
    return () => clearInterval(timer);
  }, [at]);
  return at === null ? null : Math.max(0, Math.round((now - at) / 1000));
}
