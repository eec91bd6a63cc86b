import { allocate } from '../grow-array';
import type { Vector3 } from '../measurement';
import type { WeldedMesh } from '../weld-corners';

export interface FacetDoubtOptions {
  /** The measurement's origin: an exact vertex. */
  origin: Vector3;
  /** The centroid of the body less the origin. */
  centreFromOrigin: Vector3;
  /** For each facet 1 where it is read the other way round. */
  turned?: Uint8Array;
  /** -1 where the whole is of negative volume as its facets are (after `turned`), and every one is read the other way round. */
  sign: 1 | -1;
}

/** A mesh that looks outwards, its coordinates told from the centroid of its body. */
export interface OutwardFacets {
  count: number;
  vertexCount: number;
  /** Three vertices a facet. Half-edge 3f + k runs from corner k to the next one; it has the number of the corner where it begins. */
  corners: Uint32Array;
  /** Three a vertex. */
  places: Float64Array;
  areas: Float64Array;
  /** Three a facet, of length 1; 0 where the facet has no area. `mergeFlats` puts those of the flats in their place. */
  normals: Float64Array;
  /** A length that rounding of the file's coordinates to binary32 can make up: what lies nearer to a plane lies in it. */
  rounding: number;
}

/** Of the largest coordinate: four units in its last place in binary32, one for each of the four vertices that a comparison of two facets rests on. */
const roundingShare = 1 / 2_097_152;

export function readFacets({ facetCount, vertexCount, corners, coordinates }: WeldedMesh, options: FacetDoubtOptions): OutwardFacets {
  const facets: OutwardFacets = {
    count: facetCount,
    vertexCount,
    corners: allocate(() => new Uint32Array(3 * facetCount)),
    places: allocate(() => new Float64Array(3 * vertexCount)),
    areas: allocate(() => new Float64Array(facetCount)),
    normals: allocate(() => new Float64Array(3 * facetCount)),
    rounding: 0,
  };
  let largest = 0;
  for (let at = 0; at < 3 * vertexCount; at++) {
    const coordinate = coordinates[at] ?? 0;
    const k = at % 3;
    if (Math.abs(coordinate) > largest) largest = Math.abs(coordinate);
    // The origin first: two vertices of one mesh, whose difference is exact or nearly so.
    facets.places[at] = coordinate - (options.origin[k] ?? 0) - (options.centreFromOrigin[k] ?? 0);
  }
  facets.rounding = largest * roundingShare;
  for (let facet = 0; facet < facetCount; facet++) {
    const other = (options.turned?.[facet] === 1) !== (options.sign === -1);
    facets.corners[3 * facet] = corners[3 * facet] ?? 0;
    facets.corners[3 * facet + 1] = corners[3 * facet + (other ? 2 : 1)] ?? 0;
    facets.corners[3 * facet + 2] = corners[3 * facet + (other ? 1 : 2)] ?? 0;
    shapeFacet(facets, facet);
  }
  return facets;
}

function shapeFacet({ corners, places, areas, normals }: OutwardFacets, facet: number): void {
  const a = 3 * (corners[3 * facet] ?? 0), b = 3 * (corners[3 * facet + 1] ?? 0), c = 3 * (corners[3 * facet + 2] ?? 0);
  const ax = places[a] ?? 0, ay = places[a + 1] ?? 0, az = places[a + 2] ?? 0;
  const ux = (places[b] ?? 0) - ax, uy = (places[b + 1] ?? 0) - ay, uz = (places[b + 2] ?? 0) - az;
  const vx = (places[c] ?? 0) - ax, vy = (places[c + 1] ?? 0) - ay, vz = (places[c + 2] ?? 0) - az;
  const x = uy * vz - uz * vy, y = uz * vx - ux * vz, z = ux * vy - uy * vx;
  const size = Math.sqrt(x * x + y * y + z * z);
  areas[facet] = size / 2;
  if (!(size > 0)) return;
  normals[3 * facet] = x / size;
  normals[3 * facet + 1] = y / size;
  normals[3 * facet + 2] = z / size;
}
