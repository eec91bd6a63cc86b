import type { ChangeRoleRequest, CreateInvitationRequest, Invitation, Member, Page } from '@masswright/contracts';
import { useMutation, useQuery, useQueryClient } from '@tanstack/react-query';
import { readAllPages } from '../../../lib/pages';
import { send } from '../../../lib/api';

/** Everything about people lies below this key, so that one event reads it again. */
export const peopleKey = ['people'] as const;
const membersKey = [...peopleKey, 'members'] as const;
const invitationsKey = [...peopleKey, 'invitations'] as const;

export function useMembers() {
  return useQuery({
    queryKey: membersKey,
    queryFn: ({ signal }) => readAllPages((after) => send<Page<Member>>('GET', '/members', { query: { after, limit: 200 }, signal })),
  });
}

export function useInvitations(enabled: boolean) {
  return useQuery({
    queryKey: invitationsKey,
    enabled,
    queryFn: ({ signal }) => readAllPages((after) => send<Page<Invitation>>('GET', '/invitations', { query: { after, limit: 200 }, signal })),
  });
}

function usePeopleChange<Request, Answer>(change: (request: Request) => Promise<Answer>) {
  const client = useQueryClient();
  return useMutation({ mutationFn: change, onSettled: () => client.invalidateQueries({ queryKey: peopleKey }) });
}

export const useInvite = () => usePeopleChange((body: CreateInvitationRequest) => send<Invitation>('POST', '/invitations', { body }));
export const useWithdrawInvitation = () => usePeopleChange((invitationId: string) => send<void>('DELETE', `/invitations/${invitationId}`));
export const useRemoveMember = () => usePeopleChange((userId: string) => send<void>('DELETE', `/members/${userId}`));
export const useChangeRole = () =>
  usePeopleChange(({ userId, ...body }: ChangeRoleRequest & { userId: string }) => send<Member>('PATCH', `/members/${userId}`, { body }));
