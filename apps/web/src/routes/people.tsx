import { Failure } from '../components/failure';
import { Loading } from '../components/loading';
import { Crumbs, PageHeading } from '../components/page';
import { ProblemNotice } from '../components/problem-notice';
import { useInvitations, useMembers } from '../features/people/api/people';
import { InvitationList } from '../features/people/components/invitation-list';
import { InviteForm } from '../features/people/components/invite-form';
import { MemberTable } from '../features/people/components/member-table';
import { useSignedIn } from '../features/session/api/session';
import { countOf } from '../lib/plural';
import '../features/people/components/people.css';

export function Component() {
  const session = useSignedIn();
  const members = useMembers();
  const invitations = useInvitations(session.can.managePeople);
  return (
    <>
      <Crumbs crumbs={[{ label: session.organisation.name, to: '/' }, { label: 'People' }]} />
      <PageHeading
        title="People"
        above={session.organisation.name}
        beside={members.data && <span className="soft">{countOf(members.data.length, 'person', 'people')}</span>}
      />
      <div className={`people ${session.can.managePeople ? 'people-with-invitations' : ''}`}>
        <div>
          {members.error && !members.data && <Failure error={members.error} onRetry={() => void members.refetch()} />}
          {members.isPending && <Loading what="the people" />}
          {members.data && <MemberTable members={members.data} ownUserId={session.user.id} organisationName={session.organisation.name} />}
        </div>
        {session.can.managePeople && (
          <div className="people-aside screen-only">
            <section aria-labelledby="invite-title">
              <h2 id="invite-title">Invite a colleague</h2>
              <InviteForm />
            </section>
            <section aria-labelledby="invitations-title">
              <h2 id="invitations-title">Open invitations</h2>
              {invitations.error && <ProblemNotice error={invitations.error} onRetry={() => void invitations.refetch()} />}
              {invitations.data && <InvitationList invitations={invitations.data} />}
            </section>
          </div>
        )}
      </div>
    </>
  );
}
