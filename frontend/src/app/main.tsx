import '@stayledger/shared/contracts/without-eval';
import { StrictMode } from 'react';
import { createRoot } from 'react-dom/client';
import '../theme/fonts.css';
import '../theme/theme.css';
import '../theme/base.css';
import '../theme/print.css';
import { Providers } from './providers';
import { createAppRouter } from './router';
import { RouterProvider } from 'react-router-dom';

const root = document.getElementById('root');
if (!root) throw new Error('index.html has no element with the id root.');

createRoot(root).render(
  <StrictMode>
    <Providers>
      <RouterProvider router={createAppRouter()} />
    </Providers>
  </StrictMode>,
);
