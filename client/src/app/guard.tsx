import type { MeView } from '@kerfyard/common/people';
import type { ComponentType } from 'react';
import { useTranslation } from 'react-i18next';
import { Page } from '../components/page.tsx';
import { ErrorState } from '../components/states.tsx';
import { useMaybeSession } from '../features/session/hooks/use-session.ts';
import type { Audience } from '../lib/feature-route.ts';

/** Whether a page is for this person's kind. What they may do on it is asked by permission. */
export function mayOpen(me: MeView | null, audience: Audience): boolean {
  if (audience === 'anyone') return true;
  if (me === null) return false;
  if (audience === 'signed_in') return true;
  if (audience === 'staff') return me.user.isStaff;
  if (me.company === null) return false;
  return audience === 'company' || me.company.kind === audience;
}

/** The page, or a plain "not for you": a wrong address of one's own kind of account is no mystery. */
export function guarded(Inner: ComponentType, audience: Audience): ComponentType {
  if (audience === 'anyone') return Inner;
  return function Guarded() {
    const me = useMaybeSession();
    return mayOpen(me, audience) ? <Inner /> : <ForbiddenPage />;
  };
}

function ForbiddenPage() {
  const { t } = useTranslation();
  return (
    <Page title={t('forbidden.title')}>
      <ErrorState what={t('forbidden.what')} next={t('forbidden.next')} />
    </Page>
  );
}
