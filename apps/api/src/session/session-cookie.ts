import { randomBytes } from 'node:crypto';
import { parse, serialize } from 'cookie';
import type { Request, Response } from 'express';

/** `__Host-`: the browser takes it only from this very host, over a secure context, for the whole site. */
const cookieName = '__Host-masswright';
const options = { path: '/', secure: true, httpOnly: true, sameSite: 'strict' } as const;

/** 128 random bits. Only its hash is stored. */
export function createSessionToken(): string {
  return randomBytes(16).toString('base64url');
}

export function readSessionToken(request: Request): string | undefined {
  const header = request.headers.cookie;
  return header === undefined ? undefined : parse(header)[cookieName];
}

export function setSessionCookie(response: Response, token: string, maxAgeSeconds: number): void {
  response.append('Set-Cookie', serialize(cookieName, token, { ...options, maxAge: maxAgeSeconds }));
}

export function clearSessionCookie(response: Response): void {
  response.append('Set-Cookie', serialize(cookieName, '', { ...options, maxAge: 0 }));
}
