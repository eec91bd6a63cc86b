import type { MeshFormat } from './measurement';

/** The closed list of reasons for which a mesh file is refused. */
export const meshErrorCodes = [
  'file-empty',
  'format-unknown',
  'file-truncated',
  'count-contradicts-size',
  'number-invalid',
  'number-not-finite',
  'syntax-invalid',
  'facets-none',
  'size-differs',
  'too-many-facets',
  'too-many-vertices',
  'polygon-too-large',
  'vertex-missing',
  'archive-damaged',
  'too-large-expanded',
] as const;
export type MeshErrorCode = (typeof meshErrorCodes)[number];

/** Where in the mesh, unpacked: a byte (from 0) or a line (from 1). Where the message is about the archive, a byte of that. */
export interface MeshPlace {
  byte?: number;
  line?: number;
}

/** A file that cannot be measured. The message says in words what is wrong and what to do about it. */
export class MeshError extends Error {
  override readonly name = 'MeshError';
  /** Of the mesh, once that is known. */
  format: MeshFormat | null = null;

  constructor(
    readonly code: MeshErrorCode,
    message: string,
    readonly at: MeshPlace | null = null,
  ) {
    super(message);
  }
}

/** A count as it stands in a sentence, its thousands set off by a thin space. */
export function spellCount(count: number): string {
  return String(count).replace(/\B(?=(\d{3})+$)/g, '\u2009');
}

/** `1 facet`, `2 facets`. */
export function spellCounted(count: number, noun: string): string {
  return `${spellCount(count)} ${noun}${count === 1 ? '' : 's'}`;
}
