import { useState } from 'react';
import { Link, useLocation, useNavigate } from 'react-router-dom';
import { Notice } from '../components/notice';
import { NewPasswordForm } from '../features/session/components/new-password-form';
import { parseLinkToken } from '../features/session/model/link-token';
import type { SignInState } from '../features/session/model/where-next';

export function Component() {
  const navigate = useNavigate();
  const { hash } = useLocation();
  const [link] = useState(() => parseLinkToken(hash));
  const done = (): void => {
    const state: SignInState = { sentence: 'The new password is set. Sign in with it.' };
    void navigate('/sign-in', { replace: true, state });
  };
  return (
    <section className="front-door-form">
      <title>New password – Masswright</title>
      <h1>Set a new password</h1>
      {link.token === undefined ? (
        <Notice tone="wrong">
          <p>{link.problem}</p>
        </Notice>
      ) : (
        <>
          <p className="soft">Wherever you are signed in now, you will be signed out.</p>
          <NewPasswordForm token={link.token} onDone={done} />
        </>
      )}
      <nav className="front-door-links" aria-label="Other ways in">
        <Link to="/forgotten-password">Send me another link</Link>
        <Link to="/sign-in">Back to sign in</Link>
      </nav>
    </section>
  );
}
