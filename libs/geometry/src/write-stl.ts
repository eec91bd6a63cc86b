import { facetBytes, headerBytes } from './detect-format';

/** Facets as nine coordinates each: x, y, z of three corners, counter-clockwise seen from outside. */
export type FacetCorners = ArrayLike<number>;

/** The unit normal by the right-hand rule; zeros for a facet without area. */
function computeNormal(corners: FacetCorners, at: number): [number, number, number] {
  const c = (k: number): number => corners[at + k] ?? 0;
  const ex = c(3) - c(0), ey = c(4) - c(1), ez = c(5) - c(2);
  const fx = c(6) - c(0), fy = c(7) - c(1), fz = c(8) - c(2);
  const nx = ey * fz - ez * fy, ny = ez * fx - ex * fz, nz = ex * fy - ey * fx;
  const length = Math.sqrt(nx * nx + ny * ny + nz * nz);
  return length > 0 ? [nx / length, ny / length, nz / length] : [0, 0, 0];
}

/** A binary STL file; coordinates are rounded to binary32, as the format has them. */
export function writeBinaryStl(corners: FacetCorners, title = ''): Uint8Array<ArrayBuffer> {
  const facets = Math.floor(corners.length / 9);
  const bytes = new Uint8Array(headerBytes + facetBytes * facets);
  for (let k = 0; k < Math.min(title.length, headerBytes - 4); k++) bytes[k] = title.charCodeAt(k) & 0x7f;
  const view = new DataView(bytes.buffer);
  view.setUint32(headerBytes - 4, facets, true);
  for (let facet = 0; facet < facets; facet++) {
    const at = headerBytes + facetBytes * facet;
    computeNormal(corners, 9 * facet).forEach((element, k) => view.setFloat32(at + 4 * k, element, true));
    for (let k = 0; k < 9; k++) view.setFloat32(at + 12 + 4 * k, corners[9 * facet + k] ?? 0, true);
  }
  return bytes;
}

/** An ASCII STL file; coordinates are written with all their digits, so that reading gives the same numbers. */
export function writeAsciiStl(corners: FacetCorners, title = 'mesh'): Uint8Array<ArrayBuffer> {
  const lines = [`solid ${title}`];
  for (let at = 0; at + 9 <= corners.length; at += 9) {
    lines.push(`  facet normal ${computeNormal(corners, at).join(' ')}`, '    outer loop');
    for (let corner = 0; corner < 3; corner++) {
      lines.push(`      vertex ${[0, 1, 2].map((k) => corners[at + 3 * corner + k] ?? 0).join(' ')}`);
    }
    lines.push('    endloop', '  endfacet');
  }
  return encodeAscii([...lines, `endsolid ${title}`, ''].join('\n'));
}

function encodeAscii(text: string): Uint8Array<ArrayBuffer> {
  const bytes = new Uint8Array(text.length);
  for (let k = 0; k < text.length; k++) bytes[k] = text.charCodeAt(k);
  return bytes;
}
