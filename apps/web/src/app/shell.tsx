import { useState } from 'react';
import { Link, Navigate, NavLink, Outlet, useLocation } from 'react-router-dom';
import { CrumbPlace } from '../components/page';
import { ProblemNotice } from '../components/problem-notice';
import { WordMark } from '../components/word-mark';
import { useSession } from '../features/session/api/session';
import type { SignInState } from '../features/session/model/where-next';
import { UploadTray } from '../features/uploads/components/upload-tray';
import { AccountMenu } from './account-menu';
import { KeysDialog } from './keys-dialog';
import { findSignOutSentence } from './sign-out';
import { useLiveUpdates } from './use-live-updates';
import './shell.css';

/** Lets only people who are signed in further; the others are asked to sign in and then come back to where they wanted to go. */
export function Component() {
  const { data: session, error, refetch } = useSession();
  const location = useLocation();
  const [seenSession, setSeenSession] = useState(false);
  if (session && !seenSession) setSeenSession(true);
  if (session) return <Shell organisationId={session.organisation.id} key={session.organisation.id} />;
  if (session === null) {
    const state: SignInState = { next: `${location.pathname}${location.search}`, sentence: findSignOutSentence(seenSession) };
    return <Navigate to="/sign-in" replace state={state} />;
  }
  if (!error) return null;
  return (
    <main id="main" tabIndex={-1} className="main">
      <ProblemNotice error={error} onRetry={() => void refetch()} />
    </main>
  );
}

function Shell({ organisationId }: { organisationId: string }) {
  const [crumbPlace, setCrumbPlace] = useState<HTMLElement | null>(null);
  useLiveUpdates(organisationId);
  return (
    <CrumbPlace value={crumbPlace}>
      <div className="shell">
        <header className="band screen-only">
          <Link to="/" className="band-home" aria-label="Masswright, all projects">
            <WordMark />
          </Link>
          <nav aria-label="Where you are" ref={setCrumbPlace} className="band-crumbs" />
          <nav aria-label="Organisation" className="band-links">
            <NavLink to="/" end>
              Projects
            </NavLink>
            <NavLink to="/materials">Materials</NavLink>
            <NavLink to="/people">People</NavLink>
          </nav>
          <AccountMenu />
        </header>
        <main id="main" tabIndex={-1} className="main">
          <Outlet />
        </main>
        <UploadTray />
        <KeysDialog />
      </div>
    </CrumbPlace>
  );
}
