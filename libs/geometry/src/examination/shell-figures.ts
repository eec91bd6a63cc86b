import { integrateBody } from '../integrate-body';
import type { Vector3 } from '../measurement';
import type { WeldedMesh } from '../weld-corners';
import { facetsOfShell, type ShellTable } from './shells';

/** Volume and box of each shell as the file has it, plainly summed: enough to tell its sign and to rank it, never recorded. */
export interface ShellFigures {
  volumes: Float64Array;
  /** Of the volumes; 0 where one can't be told from zero, or the shell is open. */
  signs: Int8Array;
  /** Six bounds a shell. */
  boxes: Float64Array;
}

const roundoff = 1.1102230246251565e-16;

export function findShellFigures(mesh: WeldedMesh, shells: ShellTable, diagonal: number): ShellFigures {
  const figures: ShellFigures = { volumes: new Float64Array(shells.count), signs: new Int8Array(shells.count), boxes: new Float64Array(6 * shells.count) };
  for (let shell = 0; shell < shells.count; shell++) {
    const facets = facetsOfShell(shells, shell);
    const { volume, size } = sumShell(mesh, facets, figures.boxes, 6 * shell);
    figures.volumes[shell] = volume;
    // What is open has no volume, and soup has a million such shells.
    if (shells.open[shell] === 1) continue;
    if (Math.abs(volume) > (facets.length + 16) * roundoff * size) figures.signs[shell] = Math.sign(volume);
    else figures.signs[shell] = integrateBody(mesh, firstCorner(mesh, facets), diagonal, { facets }).volumeSign;
  }
  return figures;
}

function firstCorner({ corners, coordinates }: WeldedMesh, facets: Uint32Array): Vector3 {
  const at = 3 * (corners[3 * (facets[0] ?? 0)] ?? 0);
  return [coordinates[at] ?? 0, coordinates[at + 1] ?? 0, coordinates[at + 2] ?? 0];
}

/** Volume about the first corner, the sizes of the products in it, and the box. */
function sumShell(mesh: WeldedMesh, facets: Uint32Array, boxes: Float64Array, to: number): { volume: number; size: number } {
  const { corners, coordinates } = mesh;
  const [ox, oy, oz] = firstCorner(mesh, facets);
  boxes.fill(Infinity, to, to + 3);
  boxes.fill(-Infinity, to + 3, to + 6);
  let volume = 0;
  let size = 0;
  for (let k = 0; k < facets.length; k++) {
    const facet = 3 * (facets[k] ?? 0);
    const a = 3 * (corners[facet] ?? 0), b = 3 * (corners[facet + 1] ?? 0), c = 3 * (corners[facet + 2] ?? 0);
    const ax = (coordinates[a] ?? 0) - ox, ay = (coordinates[a + 1] ?? 0) - oy, az = (coordinates[a + 2] ?? 0) - oz;
    const bx = (coordinates[b] ?? 0) - ox, by = (coordinates[b + 1] ?? 0) - oy, bz = (coordinates[b + 2] ?? 0) - oz;
    const cx = (coordinates[c] ?? 0) - ox, cy = (coordinates[c + 1] ?? 0) - oy, cz = (coordinates[c + 2] ?? 0) - oz;
    volume += ax * (by * cz - bz * cy) + ay * (bz * cx - bx * cz) + az * (bx * cy - by * cx);
    size += Math.abs(ax) * (Math.abs(by * cz) + Math.abs(bz * cy)) + Math.abs(ay) * (Math.abs(bz * cx) + Math.abs(bx * cz)) + Math.abs(az) * (Math.abs(bx * cy) + Math.abs(by * cx));
    for (let axis = 0; axis < 3; axis++) {
      const p = coordinates[a + axis] ?? 0, q = coordinates[b + axis] ?? 0, r = coordinates[c + axis] ?? 0;
      boxes[to + axis] = Math.min(boxes[to + axis] ?? 0, p, q, r);
      boxes[to + 3 + axis] = Math.max(boxes[to + 3 + axis] ?? 0, p, q, r);
    }
  }
  return { volume: volume / 6, size: size / 6 };
}
