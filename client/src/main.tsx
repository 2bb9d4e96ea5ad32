import './lib/zod-without-eval.ts';
import { StrictMode } from 'react';
import { createRoot } from 'react-dom/client';
import { RouterProvider } from 'react-router-dom';
import { Providers } from './app/providers.tsx';
import { createRouter } from './app/router.tsx';
import { startWords } from './lib/i18n.ts';
import { watchSystemTheme } from './lib/theme.ts';
import './styles/index.css';

const root = document.getElementById('root');
if (root === null) throw new Error('index.html has no #root');

watchSystemTheme();
await startWords();
createRoot(root).render(
  <StrictMode>
    <Providers>
      <RouterProvider router={createRouter()} />
    </Providers>
  </StrictMode>,
);
