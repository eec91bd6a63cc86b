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
  [/^[^]{257}ustar/, 'a tar archive'],
  [/^BZh\d/, 'a bzip2 archive'],
  [/^\xfd7zXZ\0/, 'an xz archive'],
  [/^\x28\xb5\x2f\xfd/, 'a Zstandard archive'],
  [/^7z\xbc\xaf/, 'a 7z archive'],
  [/^Rar!/, 'a RAR archive'],
  [/^(ST)?C?N?4?n?OFF\s+BINARY/, 'a binary OFF mesh, of which only the one in words is read'],
  ['PK\x05\x06', 'an empty ZIP archive'],
  [/^ISO-10303-21/, 'a STEP model'],
  ['\xd0\xcf\x11\xe0', 'a document of an office or drawing program'],
];
const textualStrangers: typeof strangers = [
  [/^\s*</, 'an XML, SVG or HTML document'],
];

/** What else a file looks like by its first bytes, one character each; undefined where nothing is known that begins so. */
export function findStranger(beginning: string, text: boolean): string | undefined {
  const candidates = text ? [...strangers, ...textualStrangers] : strangers;
  return candidates.find(([start]) => (typeof start === 'string' ? beginning.startsWith(start) : start.test(beginning)))?.[1];
}
