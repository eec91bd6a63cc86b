import { formatCount } from '@masswright/units';

/** "1 part", "2 parts", thousands set off. */
export function countOf(count: number, one: string, many = `${one}s`): string {
  return `${formatCount(count)} ${count === 1 ? one : many}`;
}
