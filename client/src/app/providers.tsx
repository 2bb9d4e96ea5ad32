import { Theme } from '@radix-ui/themes';
import { QueryClientProvider } from '@tanstack/react-query';
import type { ReactNode } from 'react';
import { Announcer } from '../components/announcer.tsx';
import { queryClient } from '../lib/query-client.ts';

/** What every page stands in: the look, the server state, the voice for screen readers. */
export function Providers({ children }: { children: ReactNode }) {
  return (
    <Theme appearance="inherit" accentColor="jade" grayColor="sand" radius="small" panelBackground="solid">
      <QueryClientProvider client={queryClient}>
        <Announcer>{children}</Announcer>
      </QueryClientProvider>
    </Theme>
  );
}
