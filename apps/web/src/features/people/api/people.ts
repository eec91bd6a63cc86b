import type { ChangeRoleRequest, CreateInvitationRequest } from '@masswright/contracts';
import { useMutation, useQuery, useQueryClient } from '@tanstack/react-query';
import { readAllPages } from '../../../lib/pages';
import { api, expectDone, unwrap } from '../../../lib/api';

/** Everything about people lies below this key, so that one event reads it again. */
export const peopleKey = ['people'] as const;
const membersKey = [...peopleKey, 'members'] as const;
const invitationsKey = [...peopleKey, 'invitations'] as const;

export function useMembers() {
  return useQuery({
    queryKey: membersKey,
    queryFn: ({ signal }) => readAllPages((after) => unwrap(api.GET('/api/v1/members', { params: { query: { after, limit: 200 } }, signal }))),
  });
}

export function useInvitations(enabled: boolean) {
  return useQuery({
    queryKey: invitationsKey,
    enabled,
    queryFn: ({ signal }) => readAllPages((after) => unwrap(api.GET('/api/v1/invitations', { params: { query: { after, limit: 200 } }, signal }))),
  });
}

function usePeopleChange<Request, Answer>(change: (request: Request) => Promise<Answer>) {
  const client = useQueryClient();
  return useMutation({ mutationFn: change, onSettled: () => client.invalidateQueries({ queryKey: peopleKey }) });
}

export const useInvite = () => usePeopleChange((body: CreateInvitationRequest) => unwrap(api.POST('/api/v1/invitations', { body })));
export const useWithdrawInvitation = () => usePeopleChange((invitationId: string) => expectDone(api.DELETE('/api/v1/invitations/{invitationId}', { params: { path: { invitationId } } })));
export const useRemoveMember = () => usePeopleChange((userId: string) => expectDone(api.DELETE('/api/v1/members/{userId}', { params: { path: { userId } } })));
export const useChangeRole = () =>
  usePeopleChange(({ userId, ...body }: ChangeRoleRequest & { userId: string }) => unwrap(api.PATCH('/api/v1/members/{userId}', { params: { path: { userId } }, body })));
