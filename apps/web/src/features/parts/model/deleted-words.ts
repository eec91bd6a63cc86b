import { keepDeletedPartsDays } from '@masswright/contracts';
import { countOf } from '../../../lib/plural';

const dayMs = 24 * 3600 * 1000;

/** Until when a part that was deleted can be had back. */
export function computeKeptUntil(deletedAt: string): Date {
  return new Date(Date.parse(deletedAt) + keepDeletedPartsDays * dayMs);
}

/** How long a deleted part can still be restored, in whole days that are surely left. */
export function describeDaysLeft(deletedAt: string, now = new Date()): string {
  const days = Math.floor((computeKeptUntil(deletedAt).getTime() - now.getTime()) / dayMs);
  return days < 1 ? 'Less than a day left' : `${countOf(days, 'day')} left`;
}
