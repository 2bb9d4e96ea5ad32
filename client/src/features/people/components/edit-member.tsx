import {
  editMemberSchema,
  type CompanyKind,
  type EditMember,
  type MemberView,
} from '@kerfyard/common/people';
import { Button, Dialog } from '@radix-ui/themes';
import { useState } from 'react';
import { useTranslation } from 'react-i18next';
import { Form } from '../../../components/form/form.tsx';
import { useAppForm } from '../../../lib/app-form.ts';
import { useEditMember } from '../api/people.queries.ts';
import styles from './people.module.css';
import { RoleAndLimits } from './role-and-limits.tsx';

/** Change a colleague's role and limits. */
export function EditMemberButton({ member, kind }: { member: MemberView; kind: CompanyKind }) {
  const { t } = useTranslation('people');
  const [isOpen, setIsOpen] = useState(false);
  return (
    <Dialog.Root open={isOpen} onOpenChange={setIsOpen}>
      <Dialog.Trigger>
        <Button variant="soft" color="gray" size="2" aria-label={t('edit.named', { name: member.name })}>
          {t('edit.change')}
        </Button>
      </Dialog.Trigger>
      <Dialog.Content maxWidth="34rem">
        <Dialog.Title>{t('edit.title', { name: member.name })}</Dialog.Title>
        <Dialog.Description size="2" color="gray" mb="4">
          {t('edit.text')}
        </Dialog.Description>
        <EditForm member={member} kind={kind} onDone={() => setIsOpen(false)} />
      </Dialog.Content>
    </Dialog.Root>
  );
}

function EditForm(props: { member: MemberView; kind: CompanyKind; onDone: () => void }) {
  const { t } = useTranslation('people');
  const { member, kind, onDone } = props;
  const edit = useEditMember();
  const none: EditMember['limits'] = { signCents: null, setAsideCents: null, changeCents: null };
  const form = useAppForm({
    schema: editMemberSchema,
    defaultValues: { role: member.role, limits: member.details?.limits ?? none },
  });
  return (
    <Form
      form={form}
      label={t('edit.title', { name: member.name })}
      onSubmit={async (values) => {
        await edit.mutateAsync({ id: member.id, ...values });
        onDone();
      }}
    >
      <RoleAndLimits control={form.control} kind={kind} />
      <div className={styles.formButtons}>
        <Button type="submit" size="3" loading={form.formState.isSubmitting}>
          {t('edit.save')}
        </Button>
        <Dialog.Close>
          <Button type="button" variant="soft" color="gray" size="3">
            {t('cancel', { ns: 'shell' })}
          </Button>
        </Dialog.Close>
      </div>
    </Form>
  );
}
