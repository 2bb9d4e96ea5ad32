import { useQuery } from '@tanstack/react-query';
import { useTranslation } from 'react-i18next';
import { Page } from '../components/page.tsx';
import { TextLink } from '../components/link.tsx';
import { Loading, QueryErrorState } from '../components/states.tsx';
import { peopleQuery } from '../features/people/api/people.queries.ts';
import { Invitations } from '../features/people/components/invitations.tsx';
import { InviteForm } from '../features/people/components/invite-form.tsx';
import { Members } from '../features/people/components/members.tsx';
import styles from '../features/people/components/people.module.css';
import { useCan, useSession } from '../features/session/hooks/use-session.ts';
import { paths } from '../lib/paths.ts';
import { queryClient } from '../lib/query-client.ts';

export function loader() {
  void queryClient.prefetchQuery(peopleQuery);
  return null;
}

/** The people of one's company: who they are, what they may do, who is on the way. */
export default function PeoplePage() {
  const { t } = useTranslation('people');
  const can = useCan();
  const me = useSession();
  const people = useQuery(peopleQuery);
  const kind = me.company?.kind ?? 'general_contractor';
  return (
    <Page title={t('title')} lead={<TextLink to={paths.company}>{me.company?.name ?? ''}</TextLink>}>
      {people.isPending && <Loading />}
      {people.isError && <QueryErrorState error={people.error} onRetry={() => void people.refetch()} />}
      {people.isSuccess && (
        <div className={styles.column}>
          <Members members={people.data.members} kind={kind} />
          <Invitations invitations={people.data.invitations} kind={kind} />
          {can('people.manage') && <InviteForm kind={kind} />}
        </div>
      )}
    </Page>
  );
}
