/** Statements of the OBJ format that say nothing about facets: names, materials, display, points and lines, and the numbers that go with them. */
const passedOver = new Set([
  ...['vt', 'vn', 'vp', 'p', 'l', 'g', 's', 'mg', 'o'],
  ...['usemtl', 'mtllib', 'usemap', 'maplib', 'bevel', 'c_interp', 'd_interp', 'lod', 'shadow_obj', 'trace_obj', 'ctech', 'stech'],
  ...['cstype', 'deg', 'bmat', 'step', 'curv', 'curv2', 'parm', 'trim', 'hole', 'scrv', 'sp', 'end', 'con', 'res'],
]);
/** Free-form surfaces, those of older versions of the format too: geometry that is not made of facets. */
const surfaces = new Set(['surf', 'bsp', 'bzp', 'cdc', 'cdp']);
/** They fetch geometry from another file or run a program. */
const references = new Set(['call', 'csh']);

export type ObjStatement = 'vertex' | 'face' | 'passed-over' | 'surface' | 'reference' | 'unknown';

/** What a statement is by its first word. `fo` is how older versions of the format wrote `f`. */
export function findObjStatement(bytes: Uint8Array, start: number, end: number): ObjStatement {
  const first = bytes[start];
  if (end - start === 1 && first === 118) return 'vertex';
  if (end - start === 1 && first === 102) return 'face';
  // None is longer; a longer word would only be a long string.
  if (end - start > 10) return 'unknown';
  const word = String.fromCharCode(...bytes.subarray(start, end));
  if (passedOver.has(word)) return 'passed-over';
  if (word === 'fo') return 'face';
  if (surfaces.has(word)) return 'surface';
  return references.has(word) ? 'reference' : 'unknown';
}

/** A text in which one of these comes first, comments aside, is taken for OBJ. */
export const openingStatements = ['v', 'vt', 'vn', 'vp', 'f', 'fo', 'g', 'o', 's', 'usemtl', 'mtllib', 'cstype'] as const;
