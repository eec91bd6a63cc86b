import type { FacetSink } from './facet-batch';
import type { FormatReader } from './format-reader';
import type { ReadingLimits } from './limits';
import { MeshError, spellCount, spellCounted, type MeshErrorCode } from './mesh-error';
import { parseCoordinate, quoteWord, refuseNumber } from './mesh-words';
import { findObjStatement } from './obj-statements';
import { parseDecimal } from './parse-decimal';
import { createPolygonMesh } from './polygon-mesh';
import { createStatementScanner } from './scan-statements';
import { createStatementLane } from './text-lane/statement-lane';

/** A position, a weight and four of a colour are the most numbers that anything writes after `v`. */
const mostVertexNumbers = 8;

/**
 * Reads the facets of an OBJ file, pushed in chunks of any size. All objects and groups are one mesh. Coordinates keep binary64. Of a vertex only x,
 * y and z count: a fourth number is a weight in free-form curves and surfaces, which polygons do not use, or the beginning of a colour. Throws a
 * MeshError with the line for what does not belong there, and for free-form surfaces, which would be missing from the mesh.
 */
export function createObjReader(limits: ReadingLimits, sink: FacetSink): FormatReader {
  const mesh = createPolygonMesh('obj', limits, sink, () => ({ line: scanner.line }));
  const vertex: [number, number, number] = [0, 0, 0];
  let numbers = 0;
  let statement: 'none' | 'vertex' | 'face' = 'none';
  let surfaceLine: number | undefined;
  const scanner = createStatementScanner('OBJ', limits, takeWord, endStatement);
  const lane = createStatementLane(limits);

  function push(bytes: Uint8Array): void {
    lane?.beginChunk();
    let at = 0;
    do at = scanner.push(bytes, takeLines(bytes, at));
    while (at < bytes.length);
  }

  /** Takes lines of the usual shape where one begins; gives the place after them. */
  function takeLines(bytes: Uint8Array, from: number): number {
    let at = from;
    while (lane !== undefined && scanner.gap !== undefined && lane.read(bytes, at, scanner.gap, mesh)) {
      at = lane.position;
      scanner.passOver(lane.lineEnds);
      mesh.addVertices(lane.vertices, lane.vertexCount);
      mesh.addPolygons(lane.polygons, lane.polygonCount);
    }
    return at;
  }

  function takeWord(bytes: Uint8Array, start: number, end: number): void {
    if (statement === 'vertex') takeCoordinate(bytes, start, end);
    else if (statement === 'face') takeCorner(bytes, start, end);
    else beginStatement(bytes, start, end);
  }

  function beginStatement(bytes: Uint8Array, start: number, end: number): void {
    const kind = findObjStatement(bytes, start, end);
    if (kind === 'vertex') {
      statement = 'vertex';
      numbers = 0;
    } else if (kind === 'face') {
      statement = 'face';
      mesh.beginPolygon();
    } else {
      if (kind === 'unknown') refuse('syntax-invalid', `Line ${spellCount(scanner.line)} begins with ${quoteWord(bytes, start, end)}, which is no statement of OBJ. Export the mesh again.`);
      if (kind === 'reference') refuse('syntax-invalid', `Line ${spellCount(scanner.line)} calls for another file by ${quoteWord(bytes, start, end)}; a mesh has to be in one file. Export it as one.`);
      if (kind === 'surface') surfaceLine ??= scanner.line;
      scanner.skipStatement();
    }
  }

  function takeCoordinate(bytes: Uint8Array, start: number, end: number): void {
    if (numbers < 3) {
      const number = parseCoordinate(bytes, start, end, scanner.line, 'OBJ');
      if (number === undefined) refuseWord(bytes, start, end, 'a coordinate');
      vertex[numbers] = number;
    } else if (numbers === mostVertexNumbers || parseDecimal(bytes, start, end) === undefined) {
      refuseWord(bytes, start, end, numbers === mostVertexNumbers ? 'the end of the line' : 'a weight or part of a colour');
    }
    numbers += 1;
  }

  function takeCorner(bytes: Uint8Array, start: number, end: number): void {
    mesh.addCorner(findVertex(bytes, start, end));
  }

  /** The vertex that a corner such as `12`, `12/7`, `12//3` or `-1/-1/-1` names: what stands before the first slash, counted from 1 or back from the last. */
  function findVertex(bytes: Uint8Array, start: number, end: number): number {
    let at = start;
    const back = bytes[at] === 45;
    if (back) at += 1;
    const digits = at;
    let index = 0;
    for (let code = bytes[at] ?? 0; at < end && code >= 48 && code <= 57; code = bytes[++at] ?? 0) if (index < 1e12) index = 10 * index + (code - 48);
    if (at === digits || (at < end && !isReference(bytes, at, end))) refuseCorner(bytes, start, end);
    const named = back ? mesh.vertexCount - index : index - 1;
    if (index === 0 || named < 0 || named >= mesh.vertexCount) refuseIndex(quoteWord(bytes, start, end), index);
    return named;
  }

  function refuseIndex(word: string, index: number): never {
    const why = index === 0 ? 'vertices are counted from 1' : `the number of vertices before it is ${spellCount(mesh.vertexCount)}`;
    refuse('vertex-missing', `The polygon in line ${spellCount(scanner.line)} of this OBJ mesh has the corner ${word}, but ${why}. Export the mesh again.`);
  }

  function refuseCorner(bytes: Uint8Array, start: number, end: number): never {
    refuseNumber(bytes, start, end, scanner.line, 'OBJ');
    refuseWord(bytes, start, end, 'a corner (the number of a vertex)');
  }

  function endStatement(): void {
    if (statement === 'vertex') endVertex();
    else if (statement === 'face') endPolygon();
    statement = 'none';
    if (lane !== undefined) scanner.pause();
  }

  function endVertex(): void {
    if (numbers < 3) refuse('syntax-invalid', `The vertex in line ${spellCount(scanner.line)} has ${spellCounted(numbers, 'coordinate')}; three belong to it. Export the mesh again.`);
    mesh.addVertex(vertex[0], vertex[1], vertex[2]);
  }

  function endPolygon(): void {
    if (mesh.corners < 3) refuse('syntax-invalid', `The polygon in line ${spellCount(scanner.line)} has ${spellCounted(mesh.corners, 'corner')}; it needs three at least. Export the mesh again.`);
    mesh.endPolygon();
  }

  function refuse(code: MeshErrorCode, message: string): never {
    throw new MeshError(code, message, { line: scanner.line });
  }

  function refuseWord(bytes: Uint8Array, start: number, end: number, wanted: string): never {
    refuse('syntax-invalid', `Line ${spellCount(scanner.line)}: ${quoteWord(bytes, start, end)} stands where ${wanted} belongs in OBJ. Export the mesh again.`);
  }

  return {
    push,
    finish() {
      scanner.finish();
      const remarks = mesh.finish();
      checkSurfaces(surfaceLine, mesh.facets);
      return remarks;
    },
    get facetsRead() {
      return mesh.facets;
    },
  };
}

/** What may follow the number of a vertex: numbers of a texture place and of a normal after slashes. */
function isReference(bytes: Uint8Array, start: number, end: number): boolean {
  if (bytes[start] !== 47) return false;
  for (let at = start + 1; at < end; at++) {
    const code = bytes[at] ?? 0;
    if ((code < 47 || code > 57) && code !== 45) return false;
  }
  return true;
}

/** Facets beside free-form surfaces would be half a body. */
function checkSurfaces(surfaceLine: number | undefined, facets: number): void {
  if (surfaceLine === undefined) return;
  const at = { line: surfaceLine };
  if (facets > 0) throw new MeshError('syntax-invalid', `This OBJ file has free-form surfaces (the first in line ${spellCount(surfaceLine)}) beside its facets; only facets can be measured. Export all of it as a mesh of triangles.`, at);
  throw new MeshError('facets-none', `This OBJ file has free-form surfaces (the first in line ${spellCount(surfaceLine)}) but no facets. Export it as a mesh of triangles.`, at);
}
