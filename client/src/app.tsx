import { QueryClientProvider } from '@tanstack/react-query';
import { BrowserRouter } from 'react-router-dom';
import { ToastProvider } from './components/ui/toast.tsx';
import { currentSession } from './features/sessions/api.ts';
import { createQueryClient } from './lib/query-client.ts';
import { AppRoutes } from './router.tsx';

/** Any answer that says 401 ends the session here too: the shell then leads to the sign-in page and back. */
const queryClient = createQueryClient({
  onSignedOut: () => queryClient.setQueryData(currentSession().queryKey, null),
});

export function App() {
  return (
    <QueryClientProvider client={queryClient}>
      <ToastProvider>
        <BrowserRouter>
          <AppRoutes />
        </BrowserRouter>
      </ToastProvider>
    </QueryClientProvider>
  );
}
