import IconContext from '@ant-design/icons/es/components/Context';
import { QueryClientProvider, type QueryClient } from '@tanstack/react-query';
import { useState, type ReactNode } from 'react';
import { pageNonce } from '../lib/page-nonce';
import { createQueryClient } from '../lib/query-client';
import { ColourModeProvider } from '../theme/colour-mode';

/** What every page needs and no page brings along. Antd's provider is not here: see antd-scope.tsx. */
export function Providers({ children, queryClient }: { children: ReactNode; queryClient?: QueryClient }) {
  const [client] = useState(() => queryClient ?? createQueryClient());
  // Icons write one style element; without the page's nonce the browser would refuse it.
  const [iconContext] = useState(() => ({ csp: { nonce: pageNonce() } }));
  return (
    <ColourModeProvider>
      <IconContext.Provider value={iconContext}>
        <QueryClientProvider client={client}>{children}</QueryClientProvider>
      </IconContext.Provider>
    </ColourModeProvider>
  );
}
