import { cutPolygon } from './cut-polygon';
import { batchFacets, createFacetBatch, flushFacets, type FacetSink } from './facet-batch';
import { noRemarks, tooManyFacets, type FormatReader, type Remark } from './format-reader';
import { growArray } from './grow-array';
import type { ReadingLimits } from './limits';
import { findingFacets } from './measurement';
import { MeshError, spellCount, spellCounted, type MeshErrorCode } from './mesh-error';
import { parseCoordinate, quoteWord, refuseNumber } from './mesh-words';
import { findObjStatement } from './obj-statements';
import { parseDecimal } from './parse-decimal';
import { findPolygonShape } from './polygon-shape';
import { createStatementScanner } from './scan-statements';

/** A position, a weight and four of a colour are the most numbers that anything writes after `v`. */
const mostVertexNumbers = 8;

/**
 * Reads the facets of an OBJ file, pushed in chunks of any size. Polygons are cut into triangles in the order of the file, each as a fan from its
 * first corner or, where that fan would fold back on itself, by its ears; all objects and groups are one mesh. Coordinates keep binary64. Of a vertex only x, y and z count: a fourth number is a weight in free-form
 * curves and surfaces, which polygons do not use, or the beginning of a colour. Throws a MeshError with the line for what does not belong there, and for
 * free-form surfaces, which would be missing from the mesh.
 */
export function createObjReader(limits: ReadingLimits, sink: FacetSink): FormatReader {
  const batch = createFacetBatch();
  const remarks = noRemarks();
  let vertices = new Float64Array(3 * 1024);
  let vertexCount = 0;
  let polygon = new Uint32Array(64);
  let corners = 0;
  let numbers = 0;
  let statement: 'none' | 'vertex' | 'face' = 'none';
  let read = 0;
  let surfaceLine: number | undefined;
  const scanner = createStatementScanner('OBJ', limits, takeWord, endStatement);

  function takeWord(bytes: Uint8Array, start: number, end: number): void {
    if (statement === 'vertex') takeCoordinate(bytes, start, end);
    else if (statement === 'face') takeCorner(bytes, start, end);
    else beginStatement(bytes, start, end);
  }

  function beginStatement(bytes: Uint8Array, start: number, end: number): void {
    const kind = findObjStatement(bytes, start, end);
    if (kind === 'vertex') {
      if (vertexCount === limits.maximumVertices) {
        refuse('too-many-vertices', `The mesh (OBJ) has more than ${spellCount(vertexCount)} vertices, the most that can be examined here. Reduce it or split it into parts.`);
      }
      statement = 'vertex';
      numbers = 0;
    } else if (kind === 'face') {
      statement = 'face';
      corners = 0;
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
      if (vertices.length < 3 * vertexCount + 3) vertices = growArray(vertices, 3 * vertexCount + 3, 3 * limits.maximumVertices);
      vertices[3 * vertexCount + numbers] = number;
    } else if (numbers === mostVertexNumbers || parseDecimal(bytes, start, end) === undefined) {
      refuseWord(bytes, start, end, numbers === mostVertexNumbers ? 'the end of the line' : 'a weight or part of a colour');
    }
    numbers += 1;
  }

  function takeCorner(bytes: Uint8Array, start: number, end: number): void {
    if (corners === limits.maximumPolygonCorners) {
      refuse('polygon-too-large', `The polygon in line ${spellCount(scanner.line)} of this OBJ mesh has more than ${spellCount(corners)} corners, the most that are read of one. Triangulate the mesh and export it again.`);
    }
    if (corners === polygon.length) polygon = growArray(polygon, corners + 1, limits.maximumPolygonCorners);
    polygon[corners] = findVertex(bytes, start, end);
    corners += 1;
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
    const vertex = back ? vertexCount - index : index - 1;
    if (index === 0 || vertex < 0 || vertex >= vertexCount) refuseIndex(quoteWord(bytes, start, end), index);
    return vertex;
  }

  function refuseIndex(word: string, index: number): never {
    const why = index === 0 ? 'vertices are counted from 1' : `the number of vertices before it is ${spellCount(vertexCount)}`;
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
  }

  function endVertex(): void {
    if (numbers < 3) refuse('syntax-invalid', `The vertex in line ${spellCount(scanner.line)} has ${spellCounted(numbers, 'coordinate')}; three belong to it. Export the mesh again.`);
    vertexCount += 1;
  }

  function endPolygon(): void {
    if (corners < 3) refuse('syntax-invalid', `The polygon in line ${spellCount(scanner.line)} has ${spellCounted(corners, 'corner')}; it needs three at least. Export the mesh again.`);
    if (read + corners - 2 > limits.maximumFacets) throw tooManyFacets(limits.maximumFacets, 'obj', { line: scanner.line });
    const triangles = corners > 3 ? cutFolded() : undefined;
    for (let k = 2; k < corners; k++) {
      if (triangles === undefined) addFacet(polygon[0] ?? 0, polygon[k - 1] ?? 0, polygon[k] ?? 0);
      else addFacet(triangles[3 * k - 6] ?? 0, triangles[3 * k - 5] ?? 0, triangles[3 * k - 4] ?? 0);
    }
  }

  /** The triangles of a polygon whose fan would fold back on itself; undefined where the fan is what there is. */
  function cutFolded(): Uint32Array | undefined {
    const { planar, folded, normal } = findPolygonShape(vertices, polygon, corners);
    if (!planar) note(remarks.nonPlanarPolygons);
    const triangles = folded && planar ? cutPolygon(vertices, polygon, corners, normal) : undefined;
    if (folded && triangles === undefined) note(remarks.foldedPolygons);
    return triangles;
  }

  function note(remark: Remark): void {
    remark.count += 1;
    if (remark.facets.length < findingFacets) remark.facets.push(read);
  }

  function addFacet(a: number, b: number, c: number): void {
    const at = 9 * batch.count;
    for (let k = 0; k < 3; k++) {
      batch.corners[at + k] = vertices[3 * a + k] ?? 0;
      batch.corners[at + 3 + k] = vertices[3 * b + k] ?? 0;
      batch.corners[at + 6 + k] = vertices[3 * c + k] ?? 0;
    }
    batch.count += 1;
    read += 1;
    if (batch.count === batchFacets) flushFacets(batch, sink);
  }

  function refuse(code: MeshErrorCode, message: string): never {
    throw new MeshError(code, message, { line: scanner.line });
  }

  function refuseWord(bytes: Uint8Array, start: number, end: number, wanted: string): never {
    refuse('syntax-invalid', `Line ${spellCount(scanner.line)}: ${quoteWord(bytes, start, end)} stands where ${wanted} belongs in OBJ. Export the mesh again.`);
  }

  return {
    push: (bytes) => scanner.push(bytes),
    finish() {
      scanner.finish();
      flushFacets(batch, sink);
      checkSurfaces(surfaceLine, read);
      return remarks;
    },
    get facetsRead() {
      return read;
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
