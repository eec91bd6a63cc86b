import { MeshError, spellCount, spellCounted } from './mesh-error';
import type { MeshFormat } from './measurement';

/** So many bytes (or all there are) decide what a file is. */
export const decidingBytes = 1024;

export const headerBytes = 84;
export const facetBytes = 50;
/** Fewer bytes than one facet after the last facet are tolerated: some programs pad. */
const slackBytes = facetBytes;

/** How files begin that people give by mistake, and what those are called. */
const strangers: readonly (readonly [beginning: RegExp | string, name: string])[] = [
  [/^\x89PNG/, 'a PNG picture'],
  [/^\xff\xd8\xff/, 'a JPEG picture'],
  [/^GIF8/, 'a GIF picture'],
  [/^RIFF[^]{4}WEBP/, 'a WebP picture'],
  [/^BM[^]{4}\0{4}/, 'a BMP picture'],
  [/^(II\*\0|MM\0\*)/, 'a TIFF picture'],
  [/^[^]{4}ftyp/, 'a film or a HEIC picture'],
  [/^%PDF/, 'a PDF document'],
  ['PK\x03\x04', 'a ZIP archive (a 3MF file is one too)'],
  ['\x1f\x8b', 'a gzip archive'],
  [/^7z\xbc\xaf/, 'a 7z archive'],
  [/^Rar!/, 'a RAR archive'],
  [/^glTF/, 'a binary glTF model'],
  [/^ply\r?\n/, 'a PLY mesh'],
  [/^ISO-10303-21/, 'a STEP model'],
  ['\xd0\xcf\x11\xe0', 'a document of an office or drawing program'],
  [/^(\xff\xfe|\xfe\xff)/, 'text in UTF-16'],
];
const textualStrangers: typeof strangers = [
  [/^\s*</, 'an XML, SVG or HTML document'],
  [/^\s*\{/, 'a JSON document'],
  [/^(#[^\n]*\s+|\s+)*(v|o|g|mtllib)\s/, 'an OBJ mesh'],
  [/^\s*(C|N|ST|4|n)*OFF\s/, 'an OFF mesh'],
];

const latin1 = (bytes: Uint8Array): string => Array.from(bytes, (byte) => String.fromCharCode(byte)).join('');

/** Text has none of the control characters but tab, line feed, vertical tab, form feed and carriage return. */
const isText = (bytes: Uint8Array): boolean => bytes.every((byte) => byte >= 32 || (byte >= 9 && byte <= 13));

function findStranger(beginning: string, text: boolean): string | undefined {
  const candidates = text ? [...strangers, ...textualStrangers] : strangers;
  return candidates.find(([start]) => (typeof start === 'string' ? beginning.startsWith(start) : start.test(beginning)))?.[1];
}

/** The format of a file, and how many facets its header declares where it has one. */
export type Detected = { format: 'stl-ascii' } | { format: Extract<MeshFormat, 'stl-binary'>; declaredFacets: number; trailingBytes: number };

/**
 * Tells what a file is by its content. Binary files that begin with "solid" are common, so the size decides first: it is 84 + 50 n for
 * n facets; then the text does. Throws a MeshError for anything that is not an STL file, and for a header that contradicts the size.
 *
 * @param beginning the first `decidingBytes` bytes, or the whole file where it is shorter
 * @param sizeBytes size of the whole file
 */
export function detectFormat(beginning: Uint8Array, sizeBytes: number): Detected {
  if (sizeBytes === 0) throw new MeshError('file-empty', 'The file is empty: it has no bytes. Export the mesh again.');
  const declared = sizeBytes >= headerBytes ? new DataView(beginning.buffer, beginning.byteOffset).getUint32(headerBytes - 4, true) : undefined;
  const spare = declared === undefined ? undefined : sizeBytes - headerBytes - facetBytes * declared;
  if (declared !== undefined && spare !== undefined && spare >= 0 && spare < slackBytes && (spare === 0 || declared > 0)) {
    return { format: 'stl-binary', declaredFacets: declared, trailingBytes: spare };
  }

  const text = isText(beginning);
  const start = latin1(beginning).replace(/^\xef\xbb\xbf/, '');
  if (text && /^\s*solid(\s|$)/i.test(start)) return { format: 'stl-ascii' };

  const stranger = findStranger(start, text);
  if (stranger !== undefined) {
    throw new MeshError('format-unknown', `This looks like ${stranger}, not like an STL mesh. Give the mesh itself, saved as STL.`, { byte: 0 });
  }
  if (text) {
    throw new MeshError('format-unknown', 'This is text, but not an STL mesh: that would begin with the word "solid". Export the mesh as STL.', { line: 1 });
  }
  if (declared === undefined || spare === undefined) {
    throw new MeshError('format-unknown', `The file has ${spellCounted(sizeBytes, 'byte')}; the shortest STL file with a facet has ${headerBytes + facetBytes}. Export the mesh again.`, { byte: 0 });
  }
  throw contradiction(declared, spare, sizeBytes);
}

function contradiction(declared: number, spare: number, sizeBytes: number): MeshError {
  const room = Math.floor((sizeBytes - headerBytes) / facetBytes);
  const at = { byte: headerBytes - 4 };
  const facts = `The header says ${spellCounted(declared, 'facet')}`;
  if (spare >= 0) {
    return new MeshError('count-contradicts-size', `${facts} but the file holds ${spellCount(room)}: the count is wrong, or this is not an STL mesh. Export it again.`, at);
  }
  if (spare % facetBytes === 0) {
    return new MeshError('count-contradicts-size', `${facts} but the file holds exactly ${spellCount(room)}: the count is wrong, or the file was cut off. Export it again.`, at);
  }
  return new MeshError('file-truncated', `${facts} but the file has room for ${spellCount(room)}: it was cut off. Export it again.`, { byte: sizeBytes });
}
