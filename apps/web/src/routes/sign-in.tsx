import { useQueryClient } from '@tanstack/react-query';
import type { Session } from '@masswright/contracts';
import { Link, Navigate, useLocation, useNavigate } from 'react-router-dom';
import { noteSignIn } from '../app/sign-out';
import { Notice } from '../components/notice';
import { sessionKey } from '../features/session/api/session';
import { SignInForm } from '../features/session/components/sign-in-form';
import { findNextPath, parseSignInState } from '../features/session/model/where-next';

export function Component() {
  const navigate = useNavigate();
  const client = useQueryClient();
  const { next, sentence } = parseSignInState(useLocation().state);
  const done = (): void => {
    noteSignIn();
    void navigate(findNextPath(next), { replace: true });
  };
  if (client.getQueryData<Session | null>(sessionKey)) return <Navigate to={findNextPath(next)} replace />;
  return (
    <section className="front-door-form">
      <title>Sign in – Masswright</title>
      <h1>Sign in</h1>
      {sentence ? (
        <Notice tone="plain" live>
          <p>{sentence}</p>
        </Notice>
      ) : (
        <p className="soft">With the e-mail address that your organisation knows you by.</p>
      )}
      <SignInForm onDone={done} />
      <nav className="front-door-links" aria-label="Other ways in">
        <Link to="/forgotten-password">I have forgotten my password</Link>
        <Link to="/sign-up">Open a new organisation</Link>
      </nav>
    </section>
  );
}
