import { linkToken } from '@masswright/contracts';

export type TokenOfLink = { token: string; problem?: undefined } | { token?: undefined; problem: string };

/** The token that a mail's link carries behind its #, where no server and no log sees it. */
export function parseLinkToken(fragment: string): TokenOfLink {
  const given = new URLSearchParams(fragment.replace(/^#/, '')).get('token');
  if (given === null) return { problem: 'This page is opened from the link in a mail from Masswright. Open that link again.' };
  const parsed = linkToken.safeParse(given);
  return parsed.success ? { token: parsed.data } : { problem: parsed.error.issues[0]?.message ?? 'This link is not complete.' };
}
