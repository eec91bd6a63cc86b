import { useState } from 'react';
import { Link, useLocation, useNavigate } from 'react-router-dom';
import { noteSignIn } from '../app/sign-out';
import { Loading } from '../components/loading';
import { Notice } from '../components/notice';
import { ProblemNotice } from '../components/problem-notice';
import { useInvitation, useSession } from '../features/session/api/session';
import { InvitationForm } from '../features/session/components/invitation-form';
import { parseLinkToken } from '../features/session/model/link-token';
import { roleTexts } from '../lib/role-texts';
import { isWorthAnotherTry } from '../lib/problem';

export function Component() {
  const navigate = useNavigate();
  const { hash } = useLocation();
  const { data: session } = useSession();
  const [link] = useState(() => parseLinkToken(hash));
  const { data: invitation, error, isLoading, refetch } = useInvitation(link.token);
  const done = (): void => {
    noteSignIn();
    void navigate('/', { replace: true });
  };
  return (
    <section className="front-door-form">
      <title>Invitation – Masswright</title>
      <h1>{invitation ? `Join ${invitation.organisationName}` : 'Invitation'}</h1>
      {link.token === undefined && (
        <Notice tone="wrong">
          <p>{link.problem}</p>
        </Notice>
      )}
      {isLoading && <Loading what="the invitation" />}
      {error && <ProblemNotice error={error} onRetry={isWorthAnotherTry(error) ? () => void refetch() : undefined} />}
      {invitation && link.token !== undefined && (
        <>
          <p className="soft">
            As {roleTexts[invitation.role].withArticle}: {roleTexts[invitation.role].may} Your e-mail address there is <b>{invitation.email}</b>.
          </p>
          <InvitationForm token={link.token} invitation={invitation} onDone={done} />
        </>
      )}
      <nav className="front-door-links" aria-label="Other ways in">
        {session ? <Link to="/">All projects</Link> : <Link to="/sign-in">Sign in instead</Link>}
      </nav>
    </section>
  );
}
