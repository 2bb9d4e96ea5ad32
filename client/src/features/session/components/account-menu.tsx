import type { MeView } from '@kerfyard/common/people';
import { lazy, Suspense, useState } from 'react';
import { AccountButton } from './account-button.tsx';

// The menu's code is only needed by those who open it; the button stands there at once.
const AccountMenuOpened = lazy(() => import('./account-menu-opened.tsx'));

/** Who is signed in, for which company; appearance and sign-out. */
export function AccountMenu({ me }: { me: MeView }) {
  const [wanted, setWanted] = useState(false);
  const button = <AccountButton me={me} aria-haspopup="menu" onClick={() => setWanted(true)} />;
  if (!wanted) return button;
  return (
    <Suspense fallback={button}>
      <AccountMenuOpened me={me} />
    </Suspense>
  );
}
