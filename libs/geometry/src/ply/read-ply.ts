import type { FacetSink } from '../facet-batch';
import { formatNames, type FormatReader } from '../format-reader';
import type { ReadingLimits } from '../limits';
import { MeshError, spellCount, type MeshPlace } from '../mesh-error';
import { createPolygonMesh } from '../polygon-mesh';
import { checkPlyHeader, countTriangleBytes } from './check-ply-header';
import { createPlyBody, type PlyBody } from './ply-body';
import type { PlyHeader } from './ply-header';
import { createPlyNumbers, type PlyNumbers } from './ply-numbers';
import { createPlyWords } from './ply-words';
import { createPlyHeaderScanner } from './scan-ply-header';

/**
 * Reads the faces of a PLY file (ASCII, or binary of either byte order), pushed in chunks of any size. Of the vertices x, y and z count and keep binary64, of the
 * faces the list `vertex_indices` or `vertex_index`; everything else is passed over, whatever its type. Throws a MeshError with the line, or the byte, for
 * what does not belong there.
 */
export function createPlyReader(format: 'ply-ascii' | 'ply-binary', limits: ReadingLimits, sink: FacetSink): FormatReader {
  const mesh = createPolygonMesh(format, limits, sink, getPlace);
  const headerScanner = createPlyHeaderScanner(limits);
  let received = 0;
  let header: PlyHeader | undefined;
  let body: PlyBody | undefined;
  let numbers: PlyNumbers | undefined;

  function getPlace(): MeshPlace {
    return numbers?.place ?? { line: headerScanner.line };
  }

  function begin(found: PlyHeader): PlyNumbers {
    checkPlyHeader(found, format, limits, { line: headerScanner.line });
    // What the file is was told by its first thousand bytes.
    if ((found.encoding === 'ascii') !== (format === 'ply-ascii')) {
      throw new MeshError('syntax-invalid', 'The header of this PLY file says too late what format the file is in. Export the mesh again, without so many comments.', { line: headerScanner.line });
    }
    header = found;
    body = createPlyBody(found, mesh, (code, message) => {
      throw new MeshError(code, message, getPlace());
    });
    return found.encoding === 'ascii' ? createPlyWords(limits, body, headerScanner.line + 1) : createPlyNumbers(found.encoding === 'little-endian', body, received);
  }

  return {
    push(bytes) {
      let rest = bytes;
      if (numbers === undefined) {
        const taken = headerScanner.push(bytes);
        received += taken;
        if (headerScanner.header === undefined) return;
        numbers = begin(headerScanner.header);
        rest = bytes.subarray(taken);
      }
      if (rest.length > 0) numbers.push(rest);
    },
    finish() {
      numbers?.finish();
      if (header === undefined || numbers === undefined || body?.done !== true) {
        const what = header === undefined ? 'in its header' : `before ${body?.describe() ?? ''} is whole`;
        throw new MeshError('file-truncated', `This PLY file (${formatNames[format]}) ends ${what}: it was cut off. Export it again.`, numbers?.end ?? { line: headerScanner.line + 1 });
      }
      const remarks = mesh.finish();
      remarks.trailingBytes = numbers.spareBytes;
      if (remarks.trailingBytes >= countTriangleBytes(header)) {
        const faces = header.elements.find(({ name }) => name === 'face')?.count ?? 0;
        throw new MeshError('count-contradicts-size', `The header of this PLY file says ${spellCount(faces)} faces, but ${spellCount(remarks.trailingBytes)} bytes follow after the last: a count is wrong. Export the mesh again.`, numbers.place);
      }
      return remarks;
    },
    get facetsRead() {
      return mesh.facets;
    },
  };
}
