import { allocate } from '../grow-array';
import { sharp } from './merge-flats';
import { next, none, previous } from './pair-edges';

/** A fan: the corners that meet in one vertex and hang together across edges that are not sharp, counter-clockwise seen from outside. */
export interface Fans {
  count: number;
  /** For each corner its fan. */
  of: Uint32Array;
  /** Corners by fans: those of fan n are order[starts[n], starts[n + 1]). */
  order: Uint32Array;
  starts: Uint32Array;
  /** By fan: 1 where it goes all around its vertex. */
  closed: Uint8Array;
}

export function walkFans(partners: Uint32Array, kinds: Uint8Array): Fans {
  const cornerCount = partners.length;
  const of = allocate(() => new Uint32Array(cornerCount)).fill(none);
  const order = allocate(() => new Uint32Array(cornerCount));
  const starts = allocate(() => new Uint32Array(cornerCount + 1));
  const closed = allocate(() => new Uint8Array(cornerCount));
  let count = 0;
  let placed = 0;
  for (let corner = 0; corner < cornerCount; corner++) {
    if (of[corner] !== none) continue;
    const first = findFirst(partners, kinds, corner);
    let at = first;
    do {
      of[at] = count;
      order[placed] = at;
      placed += 1;
      at = across(partners, kinds, previous(at));
    } while (at !== none && at !== first);
    if (at === first) closed[count] = 1;
    count += 1;
    starts[count] = placed;
  }
  // Copies of what is used: a smooth mesh has six times as many corners as fans.
  return { count, of, order, starts: starts.slice(0, count + 1), closed: closed.slice(0, count) };
}

/** Clockwise as far as there is no sharp edge; a fan that comes round begins where it was found. */
function findFirst(partners: Uint32Array, kinds: Uint8Array, corner: number): number {
  for (let at = corner; ; ) {
    const partner = across(partners, kinds, at);
    if (partner === none) return at;
    at = next(partner);
    if (at === corner) return corner;
  }
}

function across(partners: Uint32Array, kinds: Uint8Array, half: number): number {
  return kinds[half] === sharp ? none : (partners[half] ?? none);
}
