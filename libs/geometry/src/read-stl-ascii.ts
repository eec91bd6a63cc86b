import { batchFacets, createFacetBatch, flushFacets, type FacetSink } from './facet-batch';
import { noRemarks, tooManyFacets, type FormatReader } from './format-reader';
import type { ReadingLimits } from './limits';
import { MeshError, spellCount } from './mesh-error';
import { parseCoordinate, quoteWord, refuseNumber } from './mesh-words';
import { isNonFiniteWord, parseDecimal } from './parse-decimal';
import { createWordScanner } from './scan-words';
import { createFacetLane } from './text-lane/facet-lane';

/** What the reader waits for. In the name states the words up to the end of the line are a name and mean nothing. */
type Expected = 'solid' | 'facet' | 'normal' | 'normal-number' | 'outer' | 'loop' | 'vertex' | 'coordinate' | 'endloop' | 'endfacet' | NameState;
type NameState = 'solid-name' | 'normal-or-solid-name' | 'end-name' | 'normal-or-end-name';

const wanted: Record<Exclude<Expected, NameState>, string> = {
  solid: '"solid"',
  facet: '"facet" or "endsolid"',
  normal: '"normal"',
  'normal-number': 'a number of the normal (three belong to it)',
  outer: '"outer loop"',
  loop: '"loop" after "outer"',
  vertex: 'another "vertex" (a facet has three corners)',
  coordinate: 'a coordinate (three belong to a vertex)',
  endloop: '"endloop" after three corners',
  endfacet: '"endfacet"',
};

/**
 * Reads the facets of an ASCII STL file, pushed in chunks of any size. Words in any case, any white space and line ends, several solids, names of
 * several words. Coordinates keep binary64. Throws a MeshError with the line for anything that does not belong there.
 */
export function createAsciiStlReader(limits: ReadingLimits, sink: FacetSink): FormatReader {
  const batch = createFacetBatch();
  let expected: Expected = 'solid';
  let read = 0;
  let solids = 0;
  let numbers = 0;
  // Whether the name after "endsolid" has the word "solid" in it: another solid may have begun on the same line.
  let solidInName = false;
  const scanner = createWordScanner('STL', limits, takeWord, takeLineEnd);
  const lane = createFacetLane(limits);

  function push(bytes: Uint8Array): void {
    lane?.beginChunk();
    let at = 0;
    do at = scanner.push(bytes, takeFacets(bytes, at));
    while (at < bytes.length);
  }

  /** Takes facets of the usual shape where the next one is due; gives the place after them. */
  function takeFacets(bytes: Uint8Array, from: number): number {
    let at = from;
    while (lane !== undefined && expected === 'facet' && scanner.gap !== undefined) {
      const facets = lane.read(bytes, at, scanner.gap, Math.min(batchFacets - batch.count, limits.maximumFacets - read));
      if (facets === 0) break;
      batch.normals.set(lane.normals.subarray(0, 3 * facets), 3 * batch.count);
      batch.corners.set(lane.corners.subarray(0, 9 * facets), 9 * batch.count);
      at = lane.position;
      scanner.passOver(lane.lineEnds);
      countFacets(facets);
    }
    return at;
  }

  function takeLineEnd(): void {
    if (expected === 'solid-name') expected = 'facet';
    else if (expected === 'end-name' || expected === 'normal-or-end-name') expected = 'solid';
  }

  function takeWord(bytes: Uint8Array, start: number, end: number): void {
    const is = (keyword: string): boolean => isKeyword(bytes, start, end, keyword);
    switch (expected) {
      case 'coordinate':
        return takeCoordinate(bytes, start, end);
      case 'vertex':
        if (is('vertex')) return expect('coordinate');
        break;
      case 'facet':
        if (is('facet')) return expect('normal');
        if (is('endsolid')) return endSolid();
        break;
      case 'normal':
        if (is('normal')) return beginNumbers();
        break;
      case 'normal-number':
        return takeNormal(bytes, start, end);
      case 'outer':
        if (is('outer')) return expect('loop');
        break;
      case 'loop':
        if (is('loop')) return beginCorners();
        break;
      case 'endloop':
        if (is('endloop')) return expect('endfacet');
        if (is('vertex')) refuse('This facet has more than three corners, and STL holds triangles only. Triangulate the mesh and export it again.');
        break;
      case 'endfacet':
        if (is('endfacet')) return endFacet();
        break;
      case 'solid':
        if (is('solid')) return beginSolid('solid-name');
        if (is('facet') && solidInName) return beginSolid('normal');
        break;
      default:
        return takeNameWord(expected, is);
    }
    refuseWord(bytes, start, end);
  }

  /** A whole file may stand on one line, so "facet normal" ends a name too, and "endsolid" does. */
  function takeNameWord(state: NameState, is: (keyword: string) => boolean): void {
    switch (state) {
      case 'solid-name':
        if (is('facet')) expected = 'normal-or-solid-name';
        else if (is('endsolid')) endSolid();
        return;
      case 'normal-or-solid-name':
        if (is('normal')) return beginNumbers();
        expected = is('facet') ? 'normal' : 'solid-name';
        return;
      case 'end-name':
        if (is('solid')) solidInName = true;
        else if (is('facet') && solidInName) expected = 'normal-or-end-name';
        return;
      case 'normal-or-end-name':
        if (!is('normal')) return expect('end-name');
        beginSolid('normal');
        return beginNumbers();
    }
  }

  function expect(next: Expected): void {
    expected = next;
  }

  function beginSolid(next: Expected): void {
    solids += 1;
    expected = next;
  }

  function endSolid(): void {
    solidInName = false;
    expected = 'end-name';
  }

  function beginNumbers(): void {
    if (read >= limits.maximumFacets) throw tooManyFacets(limits.maximumFacets, 'stl-ascii', { line: scanner.line });
    numbers = 0;
    expected = 'normal-number';
  }

  function beginCorners(): void {
    numbers = 0;
    expected = 'vertex';
  }

  function takeNormal(bytes: Uint8Array, start: number, end: number): void {
    const number = parseDecimal(bytes, start, end) ?? (isNonFiniteWord(bytes, start, end) ? NaN : undefined);
    if (number === undefined) refuseAsNumber(bytes, start, end);
    batch.normals[3 * batch.count + numbers] = number;
    numbers += 1;
    if (numbers === 3) expected = 'outer';
  }

  function takeCoordinate(bytes: Uint8Array, start: number, end: number): void {
    const number = parseCoordinate(bytes, start, end, scanner.line, 'STL');
    if (number === undefined) refuseWord(bytes, start, end);
    batch.corners[9 * batch.count + numbers] = number;
    numbers += 1;
    if (numbers === 9) expected = 'endloop';
    else if (numbers % 3 === 0) expected = 'vertex';
  }

  function endFacet(): void {
    expected = 'facet';
    scanner.restartLine();
    countFacets(1);
    if (lane !== undefined) scanner.pause();
  }

  function countFacets(facets: number): void {
    batch.count += facets;
    read += facets;
    if (batch.count === batchFacets) flushFacets(batch, sink);
  }

  function refuse(message: string): never {
    throw new MeshError('syntax-invalid', `Line ${spellCount(scanner.line)}: ${message}`, { line: scanner.line });
  }

  function refuseWord(bytes: Uint8Array, start: number, end: number): never {
    refuse(`${quoteWord(bytes, start, end)} stands where ${wanted[expected as keyof typeof wanted]} belongs. Export the mesh again.`);
  }

  function refuseAsNumber(bytes: Uint8Array, start: number, end: number): never {
    refuseNumber(bytes, start, end, scanner.line, 'STL');
    refuseWord(bytes, start, end);
  }

  return {
    push,
    finish() {
      scanner.finish();
      if (expected !== 'solid' && expected !== 'end-name' && expected !== 'normal-or-end-name') {
        throw new MeshError('file-truncated', `The file ends in the middle of ${read > 0 ? `a solid, after ${spellCount(read)} whole facets` : 'its first solid'}; "endsolid" is missing. It was cut off: export it again.`, { line: scanner.line });
      }
      flushFacets(batch, sink);
      return { ...noRemarks(), solids };
    },
    get facetsRead() {
      return read;
    },
  };
}

/** A word in any case; setting bit 5 maps the capitals, and no other byte, onto the small letters. */
function isKeyword(bytes: Uint8Array, start: number, end: number, keyword: string): boolean {
  if (end - start !== keyword.length) return false;
  for (let k = 0; k < keyword.length; k++) if (((bytes[start + k] ?? 0) | 32) !== keyword.charCodeAt(k)) return false;
  return true;
}
