export type JsonPath = readonly (string | number)[];

const [quote, backslash, comma, colon] = [34, 92, 44, 58];
const opens = (code: number): boolean => code === 0x7b || code === 0x5b;
const closes = (code: number): boolean => code === 0x7d || code === 0x5d;
const isBlank = (code: number): boolean => code === 32 || code === 9 || code === 10 || code === 13;

/**
 * Where in a JSON text, which is known to be one, the value stands that a path of keys and indices leads to: a byte from its start. As far as the path goes
 * where it leads nowhere.
 */
export function findJsonPlace(bytes: Uint8Array, path: JsonPath): number {
  let at = skipBlanks(bytes, bytes[0] === 0xef ? 3 : 0);
  for (const step of path) {
    const found = typeof step === 'number' ? findItem(bytes, at, step) : findMember(bytes, at, step);
    if (found === undefined) break;
    at = found;
  }
  return at;
}

function skipBlanks(bytes: Uint8Array, from: number): number {
  let at = from;
  while (isBlank(bytes[at] ?? 0)) at += 1;
  return at;
}

/** The place after the string that begins here. */
function skipString(bytes: Uint8Array, from: number): number {
  let at = from + 1;
  while (at < bytes.length && bytes[at] !== quote) at += bytes[at] === backslash ? 2 : 1;
  return at + 1;
}

/** The place after the value that begins here. */
function skipValue(bytes: Uint8Array, from: number): number {
  let at = from;
  let depth = 0;
  while (at < bytes.length) {
    const code = bytes[at] ?? 0;
    if (depth === 0 && at > from && (code === comma || closes(code))) return at;
    if (code === quote) {
      at = skipString(bytes, at);
      continue;
    }
    if (opens(code)) depth += 1;
    if (closes(code)) depth -= 1;
    at += 1;
  }
  return at;
}

function findItem(bytes: Uint8Array, from: number, index: number): number | undefined {
  if (bytes[from] !== 0x5b) return undefined;
  let at = skipBlanks(bytes, from + 1);
  for (let k = 0; k < index; k++) {
    at = skipValue(bytes, at);
    if (bytes[at] !== comma) return undefined;
    at = skipBlanks(bytes, at + 1);
  }
  return closes(bytes[at] ?? 0) ? undefined : at;
}

function findMember(bytes: Uint8Array, from: number, key: string): number | undefined {
  if (bytes[from] !== 0x7b) return undefined;
  let at = skipBlanks(bytes, from + 1);
  while (bytes[at] === quote) {
    const end = skipString(bytes, at);
    const matches = new TextDecoder().decode(bytes.subarray(at + 1, end - 1)) === key;
    at = skipBlanks(bytes, end);
    if (bytes[at] === colon) at = skipBlanks(bytes, at + 1);
    if (matches) return at;
    at = skipValue(bytes, at);
    if (bytes[at] !== comma) return undefined;
    at = skipBlanks(bytes, at + 1);
  }
  return undefined;
}
