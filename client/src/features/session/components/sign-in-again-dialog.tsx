import type { MeView } from '@kerfyard/common/people';
import { Button, Dialog } from '@radix-ui/themes';
import { useQueryClient } from '@tanstack/react-query';
import { useTranslation } from 'react-i18next';
import { useNavigate } from 'react-router-dom';
import { paths } from '../../../lib/paths.ts';
import { sessionGate } from '../../../lib/session-gate.ts';
import { line } from '../../../lib/socket.ts';
import { sessionKeys } from '../api/session.queries.ts';
import { useBecome } from '../hooks/use-session.ts';
import { SignInForm } from './sign-in-form.tsx';

/** Sign in again in place: what is on the page, typed or half done, stays as it is. */
export default function SignInAgainDialog() {
  const { t } = useTranslation();
  const navigate = useNavigate();
  const become = useBecome();
  const client = useQueryClient();
  const before = sessionGate.known();

  const signedIn = (me: MeView) => {
    if (before !== null && before.userId !== me.user.id) {
      // Someone else signed in: what waits belongs to the person before and is given up.
      sessionGate.answer(false);
      become(me);
      void navigate(paths.home);
      return;
    }
    sessionGate.know({ userId: me.user.id, email: me.user.email });
    sessionGate.answer(true);
    void client.invalidateQueries({ queryKey: sessionKeys.end });
    // The live line may have given up with the session; when it has not, this does nothing.
    void line.connect();
  };

  return (
    <Dialog.Root open onOpenChange={(open) => !open && sessionGate.answer(false)}>
      <Dialog.Content maxWidth="26rem" onOpenAutoFocus={focusPassword}>
        <Dialog.Title as="h2">{t('signInAgain.title')}</Dialog.Title>
        <Dialog.Description size="2" color="gray" mb="4">
          {t('signInAgain.text')}
        </Dialog.Description>
        <SignInForm
          email={before?.email ?? ''}
          onSignedIn={signedIn}
          aside={
            <Dialog.Close>
              <Button type="button" variant="soft" color="gray">
                {t('notNow')}
              </Button>
            </Dialog.Close>
          }
        />
      </Dialog.Content>
    </Dialog.Root>
  );
}

/** The e-mail is known: what is missing is the password. */
function focusPassword(event: Event): void {
  const content = event.currentTarget;
  if (!(content instanceof HTMLElement)) return;
  const password = content.querySelector<HTMLInputElement>('input[type="password"]');
  if (password === null) return;
  event.preventDefault();
  password.focus();
}
