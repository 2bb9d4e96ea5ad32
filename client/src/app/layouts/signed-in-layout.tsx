import type { MeView } from '@kerfyard/common/people';
import { useQuery, useQueryClient } from '@tanstack/react-query';
import { useEffect } from 'react';
import { useTranslation } from 'react-i18next';
import { Navigate, Outlet } from 'react-router-dom';
import { AppShell, type NavItem } from '../../components/app-shell.tsx';
import { LineStateMark } from '../../components/line-state.tsx';
import { meQuery } from '../../features/session/api/session.queries.ts';
import { AccountMenu } from '../../features/session/components/account-menu.tsx';
import { SessionEnding } from '../../features/session/components/session-ending.tsx';
import { TalkLink } from '../../features/talk/components/talk-link.tsx';
import { refetchAfterGaps, useLine } from '../../lib/live.ts';
import { homeOf, paths } from '../../lib/paths.ts';
import { line } from '../../lib/socket.ts';

type Translate = (key: string) => string;

/** Navigation by what a person came for, in trade words. */
function navigationOf(me: MeView, t: Translate): NavItem[] {
  const shared: NavItem[] = [
    { to: paths.work, label: t('nav.work'), picture: 'work' },
    { to: paths.money, label: t('nav.money'), picture: 'money' },
    { to: paths.company, label: t('nav.company'), picture: 'company' },
  ];
  if (me.user.isStaff) return [{ to: paths.books, label: t('nav.books'), picture: 'books' }];
  if (me.company?.kind === 'general_contractor') {
    return [{ to: paths.scopes, label: t('nav.scopes'), picture: 'scopes' }, ...shared];
  }
  return [
    { to: paths.openScopes, label: t('nav.openScopes'), picture: 'openScopes' },
    { to: paths.bids, label: t('nav.bids'), picture: 'bids' },
    ...shared,
  ];
}

/** The frame of a signed-in person, and the live line that stays open across its pages. */
export function SignedInLayout() {
  const { t } = useTranslation();
  const { data: me } = useQuery(meQuery);
  useLiveLine(me?.user.id);
  const state = useLine();
  if (me === undefined || me === null) return <Navigate to={paths.home} replace />;
  const home = homeOf({ isStaff: me.user.isStaff, kind: me.company?.kind ?? null });
  return (
    <AppShell
      home={home}
      items={navigationOf(me, t)}
      side={
        <>
          <LineStateMark state={state} />
          {me.company !== null && <TalkLink />}
          <AccountMenu me={me} />
        </>
      }
    >
      <Outlet />
      <SessionEnding />
    </AppShell>
  );
}

/** Opens the line once the first content is on the screen; another person's sign-in opens it anew. */
function useLiveLine(userId: string | undefined): void {
  const client = useQueryClient();
  useEffect(() => {
    if (userId === undefined) return undefined;
    const stopRefetching = refetchAfterGaps(client);
    const timer = setTimeout(() => void line.connect(), 0);
    return () => {
      clearTimeout(timer);
      stopRefetching();
      line.disconnect();
    };
  }, [client, userId]);
}
