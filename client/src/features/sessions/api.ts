import type { QueryClient } from '@tanstack/react-query';
import { queryOptions, useMutation, useQueryClient } from '@tanstack/react-query';
import type { Session, SignIn, Welcome } from '../../../../shared/contracts/sessions.ts';
import type {
  ChangePassword,
  CreateFirstAdministrator,
  SetPassword,
} from '../../../../shared/contracts/users.ts';
import { http, HttpProblem } from '../../lib/http.ts';
import { paths } from '../../paths.ts';

/** Who is signed in; null when nobody is. */
export const currentSession = () =>
  queryOptions({
    queryKey: ['sessions', 'detail', 'current'] as const,
    queryFn: async ({ signal }): Promise<Session | null> => {
      try {
        return await http.get<Session>('/api/sessions/current', { signal });
      } catch (error) {
        if (error instanceof HttpProblem && error.status === 401) return null;
        throw error;
      }
    },
  });

/** What the sign-in page needs before anybody is known. */
export const welcomeDetail = () =>
  queryOptions({
    queryKey: ['sessions', 'detail', 'welcome'] as const,
    queryFn: ({ signal }) => http.get<Welcome>('/api/sessions/welcome', { signal }),
    // The demo is loaded, or an administrator created, outside of any live update.
    staleTime: 0,
  });

export function useSignIn() {
  const queryClient = useQueryClient();
  return useMutation({
    mutationFn: (body: SignIn) => http.post<Session>('/api/sessions', body),
    onSuccess: (session) => {
      forgetAnswers(queryClient);
      queryClient.setQueryData(currentSession().queryKey, session);
    },
  });
}

export function useSignOut() {
  return useMutation({
    mutationFn: ({ isEverywhere }: { isEverywhere: boolean }) =>
      http.delete<undefined>(isEverywhere ? '/api/sessions' : '/api/sessions/current'),
    // A whole new page: nothing that this person has seen stays in memory for the next one.
    onSuccess: () => window.location.assign(paths.signIn.to()),
  });
}

export function useChangePassword() {
  return useMutation({
    mutationFn: (body: ChangePassword) => http.post<undefined>('/api/users/me/password', body),
  });
}

export function useSetPasswordByLink() {
  return useMutation({
    mutationFn: (body: SetPassword) => http.post<undefined>('/api/users/password-by-link', body),
  });
}

export function useCreateFirstAdministrator() {
  return useMutation({
    mutationFn: (body: CreateFirstAdministrator) => http.post<unknown>('/api/users/first', body),
  });
}

/** Nothing that the last person fetched may show under the next one's name. */
function forgetAnswers(queryClient: QueryClient): void {
  queryClient.removeQueries({ predicate: (query) => query.queryKey[0] !== 'sessions' });
}
