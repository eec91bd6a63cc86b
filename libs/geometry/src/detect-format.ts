import type { MeshFormat } from './measurement';
import { MeshError, spellCount, spellCounted } from './mesh-error';
import { openingStatements } from './obj-statements';
import { findStranger } from './strangers';

/** So many bytes (or all there are) decide what a file is. */
export const decidingBytes = 1024;

export const headerBytes = 84;
export const facetBytes = 50;
/** Fewer bytes than one facet after the last facet are tolerated: some programs pad. */
const slackBytes = facetBytes;

/** What a file is: a mesh, with the number of facets that its header declares where it has one, or what a mesh is packed in. */
export type Detected = { format: Exclude<MeshFormat, 'stl-binary'> } | { format: 'stl-binary'; declaredFacets: number } | { format: 'gzip' } | { format: 'utf-16'; bigEndian: boolean };

/** Comments and blanks, then the word of an OBJ statement; or nothing but comments as far as one can see. */
const objOpening = new RegExp(`^(\\s|#[^\\r\\n]*[\\r\\n])*((${openingStatements.join('|')})\\s|#[^\\r\\n]*$)`);
const onlyComments = /^(\s|#[^\r\n]*[\r\n])*$/;

const latin1 = (bytes: Uint8Array): string => Array.from(bytes, (byte) => String.fromCharCode(byte)).join('');

/** Text has none of the control characters but tab, line feed, vertical tab, form feed and carriage return. */
const isText = (bytes: Uint8Array): boolean => bytes.every((byte) => byte >= 32 || (byte >= 9 && byte <= 13));

const isObjOpening = (start: string): boolean => objOpening.test(start) || (start.includes('#') && onlyComments.test(start));

/** How an OFF file begins, with the prefixes that say what a vertex has beside its place. */
const offOpening = /^(\s|#[^\r\n]*[\r\n])*(ST)?C?N?4?n?OFF\s/;
/** The first words of a PLY file; the line with its format comes before any element. */
const plyOpening = /^ply\s*[\r\n]/;
const plyFormat = /[\r\n]\s*format\s+(\w+)/;

const readFormats = 'STL, OBJ, PLY, OFF, 3MF or glTF';
const askForMesh = `Give the mesh itself, saved as ${readFormats}; it may be packed with gzip.`;

/**
 * Tells what a file is by its content, never by its name. Binary STL that begins with "solid" is common, so the size decides first where it is known: it
 * is 84 + 50 n for n facets; then the text does. Where it is not, whether the bytes make sense as facets takes its place.
 * Throws a MeshError for anything else, and for a header that contradicts the size.
 *
 * @param beginning the first `decidingBytes` bytes, or the whole where it is shorter
 * @param sizeBytes size of the whole; null where only its end will tell
 */
export function detectFormat(beginning: Uint8Array, sizeBytes: number | null): Detected {
  if (sizeBytes === 0) throw new MeshError('file-empty', 'The file is empty: it has no bytes. Export the mesh again.');
  const declaredFacets = beginning.length >= headerBytes ? new DataView(beginning.buffer, beginning.byteOffset).getUint32(headerBytes - 4, true) : undefined;
  if (declaredFacets !== undefined && sizeBytes !== null && fitsSize(declaredFacets, sizeBytes)) return { format: 'stl-binary', declaredFacets };

  const told = detectText(beginning) ?? detectBinary(beginning);
  if (told !== undefined) return told;
  const text = isText(beginning);
  if (declaredFacets !== undefined && sizeBytes === null && !text && looksLikeFacets(beginning)) return { format: 'stl-binary', declaredFacets };
  if (beginning[0] === 0x1f && beginning[1] === 0x8b) return { format: 'gzip' };

  const stranger = findStranger(latin1(beginning), text);
  if (stranger !== undefined) throw new MeshError('format-unknown', `This looks like ${stranger}, not like a mesh. ${askForMesh}`, { byte: 0 });
  if (text) {
    throw new MeshError('format-unknown', `This is text, but no mesh: STL would begin with the word "solid", OBJ with one of "v", "f" or the like, PLY with "ply" and OFF with "OFF". ${askForMesh}`, { line: 1 });
  }
  if (declaredFacets === undefined) {
    throw new MeshError('format-unknown', `The file has ${spellCounted(beginning.length, 'byte')}; the shortest STL file with a facet has ${headerBytes + facetBytes}. Export the mesh again.`, { byte: 0 });
  }
  if (sizeBytes !== null) checkDeclaredFacets(declaredFacets, sizeBytes);
  return { format: 'stl-binary', declaredFacets };
}

function detectText(beginning: Uint8Array): Detected | undefined {
  const [first, second] = beginning;
  if (first === 0xfe && second === 0xff) return { format: 'utf-16', bigEndian: true };
  if (first === 0xff && second === 0xfe) return { format: 'utf-16', bigEndian: false };
  if (!isText(beginning)) return undefined;
  const start = latin1(beginning).replace(/^\xef\xbb\xbf/, '');
  if (/^\s*solid(\s|$)/i.test(start)) return { format: 'stl-ascii' };
  if (isObjOpening(start)) return { format: 'obj' };
  if (plyOpening.test(start)) return { format: findPlyFormat(start) };
  if (offOpening.test(start)) return { format: 'off' };
  return /^\s*\{/.test(start) ? { format: 'gltf' } : undefined;
}

/** A mesh that says in its first bytes what it is, and that no mesh of another format would begin with. */
function detectBinary(beginning: Uint8Array): Detected | undefined {
  const start = latin1(beginning);
  // A version, and a method of packing, that exist.
  if (start.startsWith('glTF') && (beginning[4] ?? 0) < 16 && start.slice(5, 8) === '\0\0\0') return { format: 'glb' };
  if (start.startsWith('PK\x03\x04') && (beginning[5] ?? 0) === 0 && (beginning[9] ?? 0) === 0) return { format: '3mf' };
  return plyOpening.test(start) && plyFormat.test(start) ? { format: findPlyFormat(start) } : undefined;
}

function findPlyFormat(start: string): 'ply-ascii' | 'ply-binary' {
  return plyFormat.exec(start)?.[1]?.startsWith('binary') === true ? 'ply-binary' : 'ply-ascii';
}

function fitsSize(declared: number, sizeBytes: number): boolean {
  const spare = sizeBytes - headerBytes - facetBytes * declared;
  return spare >= 0 && spare < slackBytes && (spare === 0 || declared > 0);
}

/** Whether the first facets have coordinates as meshes do: not all zero, and none that is beyond 1e30 either way or no number, as one random one in four is. */
function looksLikeFacets(beginning: Uint8Array): boolean {
  const view = new DataView(beginning.buffer, beginning.byteOffset, beginning.length);
  const facets = Math.floor((beginning.length - headerBytes) / facetBytes);
  let nonzero = false;
  for (let facet = 0; facet < facets; facet++) {
    for (let k = 0; k < 9; k++) {
      const size = Math.abs(view.getFloat32(headerBytes + facetBytes * facet + 12 + 4 * k, true));
      if (size !== 0 && !(size > 1e-30 && size < 1e30)) return false;
      nonzero ||= size !== 0;
    }
  }
  return nonzero;
}

/** Bytes after the last declared facet of a binary STL file; throws a MeshError where the size contradicts the number of facets. */
export function checkDeclaredFacets(declared: number, sizeBytes: number): number {
  const spare = sizeBytes - headerBytes - facetBytes * declared;
  if (fitsSize(declared, sizeBytes)) return spare;
  const room = Math.floor((sizeBytes - headerBytes) / facetBytes);
  const at = { byte: headerBytes - 4 };
  const facts = `The header says ${spellCounted(declared, 'facet')}`;
  if (spare >= 0) {
    throw new MeshError('count-contradicts-size', `${facts} but the file holds ${spellCount(room)}: the count is wrong, or this is not an STL mesh. Export it again.`, at);
  }
  if (spare % facetBytes === 0) {
    throw new MeshError('count-contradicts-size', `${facts} but the file holds exactly ${spellCount(room)}: the count is wrong, or the file was cut off. Export it again.`, at);
  }
  throw new MeshError('file-truncated', `${facts} but the file has room for ${spellCount(room)}: it was cut off. Export it again.`, { byte: sizeBytes });
}
