let deliberate = false;

/** Called when a person signs out by themselves, so that the sign-in page doesn't tell them that their session has ended. */
export function noteSignOut(): void {
  deliberate = true;
}

/** What the sign-in page says to people who were in the middle of something. */
export function findSignOutSentence(hadSession: boolean): string | undefined {
  const wasDeliberate = deliberate;
  if (!hadSession) return undefined;
  return wasDeliberate ? 'You are signed out.' : 'Your session has ended. Sign in to go on where you were.';
}

export function noteSignIn(): void {
  deliberate = false;
}
