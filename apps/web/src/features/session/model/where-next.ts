/**
 * The page that a person wanted before they had to sign in. Only a path of this application counts:
 * a link to our sign-in page must not be able to send people to another host afterwards.
 */
export function findNextPath(wanted: unknown): string {
  if (typeof wanted !== 'string' || !/^\/(?![/\\])/.test(wanted)) return '/';
  return /^\/(sign-in|sign-up)\b/.test(wanted) ? '/' : wanted;
}

/** What travels with a person to the sign-in page. */
export interface SignInState {
  next?: string;
  sentence?: string;
}

export function parseSignInState(state: unknown): SignInState {
  if (typeof state !== 'object' || state === null) return {};
  const { next, sentence } = state as Record<string, unknown>;
  return { next: typeof next === 'string' ? next : undefined, sentence: typeof sentence === 'string' ? sentence : undefined };
}
