import { QueryClientProvider, type QueryClient } from '@tanstack/react-query';
import { useState, type ReactNode } from 'react';
import { createQueryClient } from '../lib/query-client';
import { ColourModeProvider } from '../theme/colour-mode';

/** What every page needs and no page brings along. Antd's provider is not here: see antd-scope.tsx. */
export function Providers({ children, queryClient }: { children: ReactNode; queryClient?: QueryClient }) {
  const [client] = useState(() => queryClient ?? createQueryClient());
  return (
    <ColourModeProvider>
      <QueryClientProvider client={client}>{children}</QueryClientProvider>
    </ColourModeProvider>
  );
}
