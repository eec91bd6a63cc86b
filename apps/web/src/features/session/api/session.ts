import type {
  AcceptInvitationRequest,
  PasswordResetCompletionRequest,
  PasswordResetRequest,
  Session,
  SignInRequest,
  SignUpRequest,
} from '@masswright/contracts';
import { queryOptions, skipToken, useMutation, useQuery, useQueryClient, type QueryClient } from '@tanstack/react-query';
import { api, expectDone, unwrap } from '../../../lib/api';
import { isProblem } from '../../../lib/problem';
import { announceSessionChange } from '../model/session-channel';

export const sessionKey = ['session'] as const;

/** Who is signed in; null where nobody is. */
export const sessionQuery = queryOptions<Session | null>({
  queryKey: sessionKey,
  staleTime: Infinity,
  queryFn: async ({ signal }) => {
    try {
      return await unwrap(api.GET('/api/v1/session', { signal }));
    } catch (error) {
      if (isProblem(error, 'not-signed-in')) return null;
      throw error;
    }
  },
});

export function useSession() {
  return useQuery(sessionQuery);
}

/** For what is only shown to people who are signed in: the guard of the routes sees to it that there is a session. */
export function useSignedIn(): Session {
  const { data } = useQuery(sessionQuery);
  if (!data) throw new Error('This part of the page is only for people who are signed in.');
  return data;
}

/** Forgets what was read for another person or organisation. The session itself is watched all over the page, so it stays and is set. */
export function enterSession(client: QueryClient, session: Session | null): void {
  client.removeQueries({ predicate: ({ queryKey }) => queryKey[0] !== sessionKey[0] });
  client.setQueryData(sessionKey, session);
}

/** A request that begins a session; nothing read before it may be shown after it. */
function useBeginSession<Request>(begin: (request: Request) => Promise<Session>) {
  const client = useQueryClient();
  return useMutation({
    mutationFn: begin,
    onSuccess: (session) => {
      enterSession(client, session);
      announceSessionChange();
    },
  });
}

export const useSignIn = () => useBeginSession((body: SignInRequest) => unwrap(api.POST('/api/v1/sign-in', { body })));
export const useSignUp = () => useBeginSession((body: SignUpRequest) => unwrap(api.POST('/api/v1/sign-up', { body })));
export const useAcceptInvitation = () =>
  useBeginSession((body: AcceptInvitationRequest) => unwrap(api.POST('/api/v1/invitations/acceptance', { body })));
export const useSwitchOrganisation = () =>
  useBeginSession((organisationId: string) => unwrap(api.PUT('/api/v1/session/organisation', { body: { organisationId } })));

export function useSignOut() {
  const client = useQueryClient();
  return useMutation({
    mutationFn: () => expectDone(api.POST('/api/v1/sign-out')),
    onSuccess: () => {
      enterSession(client, null);
      announceSessionChange();
    },
  });
}

export const useRequestPasswordReset = () =>
  useMutation({ mutationFn: (body: PasswordResetRequest) => unwrap(api.POST('/api/v1/password-resets', { body })) });
export const useCompletePasswordReset = () =>
  useMutation({
    mutationFn: (body: PasswordResetCompletionRequest) => expectDone(api.POST('/api/v1/password-resets/completion', { body })),
  });

/** What an invitation's link stands for; the token travels in the body, never in a URL. */
export function useInvitation(token: string | undefined) {
  return useQuery({
    queryKey: ['invitation', token],
    staleTime: Infinity,
    queryFn: token === undefined ? skipToken : ({ signal }) => unwrap(api.POST('/api/v1/invitations/lookup', { body: { token }, signal })),
  });
}
