import type { Role } from '@masswright/contracts';
import { AppError } from '../platform/app-error';

type Anyone = { role: Role };

/** Administrators and engineers make and change projects, parts and settings; reviewers and readers read them. */
export const mayEdit = (actor: Anyone): boolean => actor.role === 'administrator' || actor.role === 'engineer';
export const mayCreateProject = mayEdit;

export function requireEdit(actor: Anyone): void {
  if (!mayEdit(actor)) throw new AppError('forbidden', 'Your role here lets you read, not change. Ask an administrator for the role of engineer.');
}
