import type { MeView } from '@kerfyard/common/people';
import { useEffect } from 'react';
import { useTranslation } from 'react-i18next';
import { redirect, useNavigate } from 'react-router-dom';
import { ButtonLink, TextLink } from '../components/link.tsx';
import { demoPeopleQuery } from '../features/first-look/api/demo.queries.ts';
import { DemoDoors } from '../features/first-look/components/demo-doors.tsx';
import { ExamplePanel } from '../features/first-look/components/example-panel.tsx';
import styles from '../features/first-look/components/first-look.module.css';
import { meQuery } from '../features/session/api/session.queries.ts';
import { useBecome } from '../features/session/hooks/use-session.ts';
import { homeOf, paths } from '../lib/paths.ts';
import { queryClient } from '../lib/query-client.ts';
import { sessionGate } from '../lib/session-gate.ts';

const homeFor = (me: MeView) => homeOf({ isStaff: me.user.isStaff, kind: me.company?.kind ?? null });

/** Someone signed in goes straight to their pages. Nobody is asked for when this browser has never signed in. */
export async function loader() {
  const me = sessionGate.hinted() ? await queryClient.ensureQueryData(meQuery).catch(() => null) : null;
  if (me !== null) return redirect(homeFor(me));
  void queryClient.prefetchQuery(demoPeopleQuery);
  return null;
}

/** One screen: what this is and for whom, a scope to look at, and the ways in. */
export default function FirstLookPage() {
  const { t } = useTranslation('first-look');
  const navigate = useNavigate();
  const become = useBecome();
  useEffect(() => {
    document.title = `Kerfyard: ${t('title')}`;
  }, [t]);
  const enter = (me: MeView) => {
    become(me);
    void navigate(homeFor(me));
  };
  return (
    <div className={styles.look}>
      <div className={styles.words}>
        <h1 className={styles.title}>{t('title')}</h1>
        <p className={styles.lead}>{t('lead')}</p>
        <ul className={styles.ways}>
          <li>{t('ways.gc')}</li>
          <li>{t('ways.crew')}</li>
          <li>{t('ways.numbers')}</li>
        </ul>
        <div className={styles.doors}>
          <ButtonLink to={paths.signUp('general_contractor')} size="3">
            {t('join.gc')}
          </ButtonLink>
          <ButtonLink to={paths.signUp('cutting_contractor')} size="3">
            {t('join.crew')}
          </ButtonLink>
        </div>
        <DemoDoors onSignedIn={enter} />
        <p className={styles.calculators}>
          <TextLink to={paths.calculators}>{t('calculators')}</TextLink>
        </p>
      </div>
      <ExamplePanel />
      <p className={styles.foot}>{t('caution')}</p>
    </div>
  );
}
