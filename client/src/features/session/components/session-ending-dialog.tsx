import type { SessionEndView } from '@kerfyard/common/people';
import { AlertDialog, Button, Flex } from '@radix-ui/themes';
import { useMutation, useQueryClient } from '@tanstack/react-query';
import { useCallback, useState } from 'react';
import { useTranslation } from 'react-i18next';
import { useTimeLeft, useTimeLeftWords } from '../../../components/countdown.tsx';
import { refreshSession } from '../../../lib/api-client.ts';
import { sessionGate } from '../../../lib/session-gate.ts';
import { sessionKeys } from '../api/session.queries.ts';

/** How long is left, and the button that extends it; at its last moment, the way to a new sign-in. */
export default function SessionEndingDialog({ end }: { end: SessionEndView }) {
  const { t } = useTranslation();
  const client = useQueryClient();
  const [isOpen, setIsOpen] = useState(true);
  const close = useCallback(() => setIsOpen(false), []);
  const left = useTimeLeft(end.endsAt, close);
  const words = useTimeLeftWords();
  const go = useMutation({
    mutationFn: async () => {
      if (end.isFinal) await sessionGate.ask();
      else await refreshSession();
    },
    onSuccess: () => client.invalidateQueries({ queryKey: sessionKeys.end }),
    // Turned down, or no answer: the warning has done what it can, and the next request asks to sign in.
    onSettled: close,
  });
  return (
    <AlertDialog.Root open={isOpen && !go.isPending} onOpenChange={setIsOpen}>
      <AlertDialog.Content maxWidth="28rem">
        <AlertDialog.Title>{t('sessionEnding.title')}</AlertDialog.Title>
        <AlertDialog.Description size="3">
          {t(end.isFinal ? 'sessionEnding.final' : 'sessionEnding.text', { left: words(left) })}
        </AlertDialog.Description>
        <Flex gap="3" mt="5" justify="end" wrap="wrap">
          <AlertDialog.Cancel>
            <Button variant="soft" color="gray" size="3">
              {t('sessionEnding.later')}
            </Button>
          </AlertDialog.Cancel>
          <Button size="3" onClick={() => go.mutate()}>
            {t(end.isFinal ? 'sessionEnding.again' : 'sessionEnding.stay')}
          </Button>
        </Flex>
      </AlertDialog.Content>
    </AlertDialog.Root>
  );
}
