import { useQueryClient } from '@tanstack/react-query';
import { useEffect, useRef } from 'react';
import { Outlet, ScrollRestoration, useLocation } from 'react-router-dom';
import type { Session } from '@masswright/contracts';
import { enterSession, sessionKey, sessionQuery } from '../features/session/api/session';
import { watchSessionChange } from '../features/session/model/session-channel';

/** After another tab signed in, out or over: what this one has read may be another person's. */
function useSharedSession(): void {
  const client = useQueryClient();
  useEffect(
    () =>
      watchSessionChange(() => {
        const before = client.getQueryData<Session | null>(sessionKey);
        client.fetchQuery({ ...sessionQuery, staleTime: 0 }).then(
          (now) => {
            if (now?.user.id !== before?.user.id || now?.organisation.id !== before?.organisation.id) enterSession(client, now);
          },
          () => undefined,
        );
      }),
    [client],
  );
}

/** Moves the focus to the new page's content, as a page that was loaded whole would; the first page keeps the browser's own. */
function useFocusOnNavigation(): void {
  const { pathname } = useLocation();
  const first = useRef(true);
  useEffect(() => {
    if (first.current) {
      first.current = false;
      return;
    }
    const main = document.getElementById('main');
    if (main && !main.contains(document.activeElement)) main.focus({ preventScroll: true });
  }, [pathname]);
}

export function Root() {
  useSharedSession();
  useFocusOnNavigation();
  return (
    <>
      <a className="skip-link" href="#main">
        Skip to the content
      </a>
      <Outlet />
      <ScrollRestoration />
    </>
  );
}
