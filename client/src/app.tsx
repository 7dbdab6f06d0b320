import { QueryClientProvider } from '@tanstack/react-query';
import { BrowserRouter } from 'react-router-dom';
import { AppShell } from './components/layout/app-shell.tsx';
import { UnknownAddress } from './components/layout/unknown-address.tsx';
import { ToastProvider } from './components/ui/toast.tsx';
import { createQueryClient } from './lib/query-client.ts';

const queryClient = createQueryClient();

export function App() {
  return (
    <QueryClientProvider client={queryClient}>
      <ToastProvider>
        <BrowserRouter>
          <AppShell home="/" areas={[]} person={{ name: '', role: '', items: [] }} isLive={false}>
            <UnknownAddress home="/" />
          </AppShell>
        </BrowserRouter>
      </ToastProvider>
    </QueryClientProvider>
  );
}
