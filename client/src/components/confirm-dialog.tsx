import { AlertDialog, Button, Flex, Text } from '@radix-ui/themes';
import { useState, type ReactElement, type ReactNode } from 'react';
import { useTranslation } from 'react-i18next';
import { useErrorWords } from '../lib/error-words.ts';

interface ConfirmDialogProps {
  /** The button that opens it. */
  trigger: ReactElement;
  title: string;
  /** What will happen, in plain words; for money, the amounts. */
  text: string;
  /** More than words: a table of amounts, a reason field. */
  children?: ReactNode;
  /** The verb on the button: "Award", "Withdraw the bid". */
  confirm: string;
  /** Something is lost by it. */
  destructive?: boolean;
  /** Not now: the line is down, or a choice is missing. */
  disabled?: boolean;
  /** Asked when it is about to open: false keeps it closed, and the page says why. */
  mayOpen?: () => boolean;
  /** Closes when it resolves; an error is shown in place and may be tried again. */
  onConfirm: () => Promise<unknown>;
}

/** Asks before money, papers or work change hands. */
export function ConfirmDialog(props: ConfirmDialogProps) {
  const { t } = useTranslation();
  const words = useErrorWords();
  const [open, setOpen] = useState(false);
  const [busy, setBusy] = useState(false);
  const [failure, setFailure] = useState<{ error: unknown } | null>(null);

  const change = (next: boolean) => {
    if (busy || (next && props.mayOpen?.() === false)) return;
    setFailure(null);
    setOpen(next);
  };
  const confirm = async () => {
    setBusy(true);
    setFailure(null);
    try {
      await props.onConfirm();
      setOpen(false);
    } catch (error) {
      setFailure({ error });
    } finally {
      setBusy(false);
    }
  };
  const shown = failure === null ? null : words(failure.error);

  return (
    <AlertDialog.Root open={open} onOpenChange={change}>
      <AlertDialog.Trigger>{props.trigger}</AlertDialog.Trigger>
      <AlertDialog.Content maxWidth="30rem">
        <AlertDialog.Title as="h2">{props.title}</AlertDialog.Title>
        <AlertDialog.Description size="3" mb="3">
          {props.text}
        </AlertDialog.Description>
        {props.children}
        <div role="alert">
          {shown !== null && (
            <Text as="p" color="red" mt="3">
              {shown.what} {shown.next}
            </Text>
          )}
        </div>
        <Flex gap="3" mt="5" justify="end" wrap="wrap">
          <AlertDialog.Cancel>
            <Button variant="soft" color="gray" size="3" disabled={busy}>
              {t('cancel')}
            </Button>
          </AlertDialog.Cancel>
          <Button
            size="3"
            {...(props.destructive === true ? { color: 'red' as const } : {})}
            loading={busy}
            disabled={props.disabled ?? false}
            onClick={() => void confirm()}
          >
            {props.confirm}
          </Button>
        </Flex>
      </AlertDialog.Content>
    </AlertDialog.Root>
  );
}
