import type { Role } from '@masswright/contracts';
import { AppError } from '../platform/app-error';

type Anyone = { role: Role };

/** Administrators invite, change roles and remove; everybody sees who is there. */
export const mayManagePeople = (actor: Anyone): boolean => actor.role === 'administrator';

export function requireManagePeople(actor: Anyone): void {
  if (!mayManagePeople(actor)) throw new AppError('forbidden', 'Only an administrator can change who is in the organisation.');
}

/** An organisation without an administrator could never have one again. */
export const isLastAdministrator = (member: Anyone, administrators: number): boolean => member.role === 'administrator' && administrators <= 1;

export function requireNotLastAdministrator(member: Anyone, administrators: number): void {
  if (isLastAdministrator(member, administrators)) {
    throw new AppError('conflict', 'This is the last administrator. Make another person administrator first.');
  }
}
