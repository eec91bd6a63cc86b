import { Link } from 'react-router-dom';
import { ForgottenPasswordForm } from '../features/session/components/forgotten-password-form';

export function Component() {
  return (
    <section className="front-door-form">
      <title>Forgotten password – Masswright</title>
      <h1>Forgotten password</h1>
      <p className="soft">We send a link by which you set a new one. Your old password works until then.</p>
      <ForgottenPasswordForm />
      <nav className="front-door-links" aria-label="Other ways in">
        <Link to="/sign-in">Back to sign in</Link>
      </nav>
    </section>
  );
}
