import { Link, useNavigate } from 'react-router-dom';
import { noteSignIn } from '../app/sign-out';
import { SignUpForm } from '../features/session/components/sign-up-form';

export function Component() {
  const navigate = useNavigate();
  const done = (): void => {
    noteSignIn();
    void navigate('/', { replace: true });
  };
  return (
    <section className="front-door-form">
      <title>Open an organisation – Masswright</title>
      <h1>Open an organisation</h1>
      <p className="soft">You become its administrator. To join one that exists, ask a colleague there to invite you.</p>
      <SignUpForm onDone={done} />
      <nav className="front-door-links" aria-label="Other ways in">
        <Link to="/sign-in">I have an account: sign in</Link>
      </nav>
    </section>
  );
}
