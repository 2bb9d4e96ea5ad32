import type { InvitationOfferView, MeView } from '@kerfyard/common/people';
import { Text } from '@radix-ui/themes';
import { useQuery } from '@tanstack/react-query';
import { useState } from 'react';
import { useTranslation } from 'react-i18next';
import { useNavigate, useSearchParams } from 'react-router-dom';
import { ButtonLink } from '../components/link.tsx';
import { Page } from '../components/page.tsx';
import { ErrorState, Loading, QueryErrorState } from '../components/states.tsx';
import { offerQuery } from '../features/people/api/people.queries.ts';
import { AcceptForm } from '../features/people/components/accept-form.tsx';
import { SignInForm } from '../features/session/components/sign-in-form.tsx';
import { useBecome } from '../features/session/hooks/use-session.ts';
import { homeOf, paths } from '../lib/paths.ts';

/** Where an invitation's link leads: what is offered, then name and password, then the sign-in. */
export default function InvitationPage() {
  const { t } = useTranslation('people');
  const token = useSearchParams()[0].get('token') ?? '';
  const [accepted, setAccepted] = useState<InvitationOfferView | null>(null);
  // Once taken up it is not asked for again: its link would say that it was used.
  const offer = useQuery({ ...offerQuery(token), enabled: token !== '' && accepted === null });
  if (accepted !== null) return <Joined offer={accepted} />;
  if (token === '') {
    return (
      <Page title={t('accept.title')} width="narrow">
        <ErrorState
          what={t('errors.link_unknown.what', { ns: 'shell' })}
          next={t('errors.link_unknown.next', { ns: 'shell' })}
        />
      </Page>
    );
  }
  if (!offer.isSuccess) {
    return (
      <Page title={t('accept.title')} width="narrow">
        {offer.isPending && <Loading />}
        {offer.isError && <QueryErrorState error={offer.error} onRetry={() => void offer.refetch()} />}
        {offer.isError && (
          <Text as="p" mt="4" color="gray">
            {t('accept.askAgain')}
          </Text>
        )}
      </Page>
    );
  }
  const { company, email, role, invitedBy, hasAccount } = offer.data;
  return (
    <Page
      title={t('accept.titleOf', { company: company.name })}
      width="narrow"
      lead={t('accept.lead', { invitedBy, role: t(`role.${role}`), email })}
    >
      {hasAccount ? (
        <ErrorState
          what={t('accept.hasAccount', { email })}
          next={t('accept.hasAccountNext', { invitedBy })}
          action={<ButtonLink to={paths.signIn()}>{t('signIn', { ns: 'shell' })}</ButtonLink>}
        />
      ) : (
        <div className="k-panel" style={{ maxWidth: '28rem' }}>
          <AcceptForm token={token} email={email} onAccepted={() => setAccepted(offer.data)} />
        </div>
      )}
    </Page>
  );
}

/** The link proves the address but signs nobody in. */
function Joined({ offer }: { offer: InvitationOfferView }) {
  const { t } = useTranslation('people');
  const navigate = useNavigate();
  const become = useBecome();
  const signedIn = (me: MeView) => {
    become(me);
    void navigate(homeOf({ isStaff: me.user.isStaff, kind: me.company?.kind ?? null }), { replace: true });
  };
  return (
    <Page
      title={t('accept.doneTitle')}
      width="narrow"
      lead={t('accept.doneText', { company: offer.company.name })}
    >
      <div className="k-panel" style={{ maxWidth: '26rem' }}>
        <SignInForm email={offer.email} onSignedIn={signedIn} />
      </div>
    </Page>
  );
}
