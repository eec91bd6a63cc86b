import type { FacetSink } from './facet-batch';
import { tooManyFacets, type FormatReader } from './format-reader';
import type { ReadingLimits } from './limits';
import { MeshError, spellCount, spellCounted, type MeshErrorCode } from './mesh-error';
import { parseCoordinate, quoteWord, refuseNumber } from './mesh-words';
import { parseDecimal } from './parse-decimal';
import { createPolygonMesh } from './polygon-mesh';
import { createStatementScanner } from './scan-statements';

/** A position, a normal, a colour and a place on a texture. */
const mostVertexNumbers = 3 + 3 + 4 + 2;

type Statement = 'keyword' | 'counts' | 'vertex' | 'face' | 'after';

/**
 * Reads the faces of an OFF file in words, pushed in chunks of any size: a line for each vertex and face, comments from `#` on. Of a vertex x, y and z count and
 * keep binary64; normals, colours and places on a texture are passed over, with or without a prefix that announces them. Faces of one or
 * two corners are points and lines. Throws a MeshError with the line for what does not belong there, and for vertices of four or more dimensions.
 */
export function createOffReader(limits: ReadingLimits, sink: FacetSink): FormatReader {
  const mesh = createPolygonMesh('off', limits, sink, () => ({ line: scanner.line }));
  const point: [number, number, number] = [0, 0, 0];
  // Vertices, faces and edges, of which nothing depends on the last.
  const counts: number[] = [];
  let statement: Statement = 'keyword';
  let words = 0;
  let corners = 0;
  let faces = 0;
  const scanner = createStatementScanner('OFF', limits, takeWord, endStatement);

  function takeWord(bytes: Uint8Array, start: number, end: number): void {
    switch (statement) {
      case 'keyword':
        takeKeyword(bytes, start, end);
        break;
      case 'counts':
        takeCount(bytes, start, end);
        break;
      case 'vertex':
        takeCoordinate(bytes, start, end);
        break;
      case 'face':
        takeCorner(bytes, start, end);
        break;
      case 'after':
        refuse('count-contradicts-size', `Line ${spellCount(scanner.line)} comes after the ${spellCounted(counts[1] ?? 0, 'face')} that the header of this OFF file says are in it: a count is wrong. Export the mesh again.`);
    }
    words += 1;
  }

  function takeKeyword(bytes: Uint8Array, start: number, end: number): void {
    const word = String.fromCharCode(...bytes.subarray(start, Math.min(end, start + 16)));
    if (word.includes('4') || word.includes('n')) refuse('syntax-invalid', `This OFF file has vertices of other than three dimensions (${quoteWord(bytes, start, end)}). Export the mesh in three.`);
    if (!/^(ST)?C?N?OFF$/.test(word)) refuse('syntax-invalid', `Line ${spellCount(scanner.line)}: ${quoteWord(bytes, start, end)} stands where "OFF" belongs. Export the mesh again.`);
    statement = 'counts';
  }

  function takeCount(bytes: Uint8Array, start: number, end: number): void {
    const word = String.fromCharCode(...bytes.subarray(start, Math.min(end, start + 16)));
    if (word === 'BINARY') refuse('syntax-invalid', 'This is a binary OFF file; only the one in words is read. Save it as text, or export it as binary STL or PLY.');
    if (counts.length === 3 || !/^\d{1,15}$/.test(word)) refuseWord(bytes, start, end, counts.length === 3 ? 'the end of the line' : 'a number of vertices, faces or edges');
    counts.push(Number(word));
  }

  function takeCoordinate(bytes: Uint8Array, start: number, end: number): void {
    if (words < 3) {
      const number = parseCoordinate(bytes, start, end, scanner.line, 'OFF');
      if (number === undefined) refuseWord(bytes, start, end, 'a coordinate');
      point[words] = number;
    } else if (words >= mostVertexNumbers) refuseWord(bytes, start, end, 'the end of the line');
  }

  function takeCorner(bytes: Uint8Array, start: number, end: number): void {
    const number = parseDecimal(bytes, start, end);
    if (number === undefined || !Number.isInteger(number)) {
      refuseNumber(bytes, start, end, scanner.line, 'OFF');
      refuseWord(bytes, start, end, words === 0 ? 'the number of corners of a face' : 'a corner (the number of a vertex)');
    }
    if (words === 0) {
      if (number < 0) refuseWord(bytes, start, end, 'the number of corners of a face');
      corners = number;
      mesh.beginPolygon();
    } else {
      if (number < 0 || number >= mesh.vertexCount) {
        refuse('vertex-missing', `The face in line ${spellCount(scanner.line)} of this OFF mesh has the corner ${quoteWord(bytes, start, end)}, but its vertices are numbered from 0 to ${spellCount(mesh.vertexCount - 1)}. Export the mesh again.`);
      }
      mesh.addCorner(number);
    }
    // A colour may follow.
    if (words === corners) scanner.skipStatement();
  }

  function endStatement(): void {
    if (words === 0) return;
    if (statement === 'counts') endCounts();
    else if (statement === 'vertex') endVertex();
    else if (statement === 'face') endFace();
    words = 0;
  }

  /** The counts may stand in the line of the keyword or in one of their own; the number of edges may be missing. */
  function endCounts(): void {
    if (counts.length === 0) return;
    const [vertices, wanted] = counts;
    if (vertices === undefined || wanted === undefined) refuse('syntax-invalid', `Line ${spellCount(scanner.line)} of this OFF file has to say how many vertices and faces there are. Export the mesh again.`);
    if (vertices > limits.maximumVertices) {
      refuse('too-many-vertices', `The mesh (OFF) has more than ${spellCount(limits.maximumVertices)} vertices, the most that can be examined here. Reduce it or split it into parts.`);
    }
    if (wanted > limits.maximumFacets) throw tooManyFacets(limits.maximumFacets, 'off', { line: scanner.line });
    statement = vertices > 0 ? 'vertex' : wanted > 0 ? 'face' : 'after';
  }

  function endVertex(): void {
    if (words < 3) refuse('syntax-invalid', `The vertex in line ${spellCount(scanner.line)} of this OFF mesh has ${spellCounted(words, 'coordinate')}; three belong to it. Export the mesh again.`);
    mesh.addVertex(point[0], point[1], point[2]);
    if (mesh.vertexCount === counts[0]) statement = (counts[1] ?? 0) > 0 ? 'face' : 'after';
  }

  function endFace(): void {
    if (mesh.corners < corners) {
      refuse('syntax-invalid', `The face in line ${spellCount(scanner.line)} of this OFF mesh says it has ${spellCounted(corners, 'corner')} and has ${spellCount(mesh.corners)}. Export the mesh again.`);
    }
    if (corners > 2) mesh.endPolygon();
    faces += 1;
    if (faces === counts[1]) statement = 'after';
  }

  function refuse(code: MeshErrorCode, message: string): never {
    throw new MeshError(code, message, { line: scanner.line });
  }

  function refuseWord(bytes: Uint8Array, start: number, end: number, wanted: string): never {
    refuse('syntax-invalid', `Line ${spellCount(scanner.line)}: ${quoteWord(bytes, start, end)} stands where ${wanted} belongs in OFF. Export the mesh again.`);
  }

  return {
    push: (bytes) => scanner.push(bytes),
    finish() {
      scanner.finish();
      if (statement !== 'after') {
        const whole = statement === 'face' ? `after ${spellCount(faces)} of ${spellCounted(counts[1] ?? 0, 'face')}` : statement === 'vertex' ? `after ${spellCount(mesh.vertexCount)} of ${spellCounted(counts[0] ?? 0, 'vertex')}` : 'before it has said how many vertices and faces there are';
        throw new MeshError('file-truncated', `This OFF file ends ${whole.replace('vertexs', 'vertices')}: it was cut off. Export it again.`, { line: scanner.line });
      }
      return mesh.finish();
    },
    get facetsRead() {
      return mesh.facets;
    },
  };
}
