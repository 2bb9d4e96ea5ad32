import { useTranslation } from 'react-i18next';
import { redirect } from 'react-router-dom';
import { Page } from '../components/page.tsx';
import { meQuery } from '../features/session/api/session.queries.ts';
import { homeOf } from '../lib/paths.ts';
import { queryClient } from '../lib/query-client.ts';
import { sessionGate } from '../lib/session-gate.ts';

/** Someone signed in goes straight to their pages. Nobody is asked for when this browser has never signed in. */
export async function loader() {
  if (!sessionGate.hinted()) return null;
  const me = await queryClient.ensureQueryData(meQuery);
  if (me === null) return null;
  return redirect(homeOf({ isStaff: me.user.isStaff, kind: me.company?.kind ?? null }));
}

export default function FirstLookPage() {
  const { t } = useTranslation('first-look');
  return <Page title={t('title')}>{null}</Page>;
}
