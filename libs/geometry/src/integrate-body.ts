import { batchFacets } from './facet-batch';
import { computeErrorBound, blockedRoundings, doubleDoubleRoundings } from './error-bound';
import { sumsOfBody, type FacetSums } from './facet-sums';
import { finishIntegrals } from './finish-integrals';
import { carefulKernel, usualKernel, type Kernel } from './kernel/summing';
import type { Integrals, Vector3 } from './measurement';
import type { WeldedMesh } from './weld-corners';

/** Which facets of a mesh are integrated, and how they are read. */
export interface FacetSelection {
  /** Indices, ascending; all of them where this is left out. */
  facets?: Uint32Array;
  /** For each facet of the mesh, 1 where it is read the other way round. */
  turned?: Uint8Array;
  /** Facets that the mesh does not have, after the others: nine coordinates each. */
  added?: Float64Array;
}

export interface BodyIntegrals {
  /** As the facets are read: the content is negative where they look inwards. An error bound of 1 where it may be zero. */
  volume: Integrals;
  /** Of the volume; 0 where it is within its error bound of zero, or the body is too small for its fifth powers to be numbers. */
  volumeSign: -1 | 0 | 1;
  surface: Integrals;
}

/** Bounds on the rounding, in the natural scale, above which the careful kernel takes over. Long thin facets are common, and tolerances need no more of an area. */
const bodyTolerance = 1e-14;
const surfaceTolerance = 1e-12;

/** A body whose box is smaller cannot be integrated: fifth powers would leave the range of binary64. */
const leastDiagonal = 1e-45;

/** What may be zero is known no better than to itself; a record can't hold an infinite number. */
const stateBound = (bound: number): number => Math.min(bound, 1);

/** Chooses the sums that are exact enough: the usual ones where their bounds allow it, those of the careful kernel otherwise, which are asked for only then. */
export function finishBody(usual: FacetSums, diagonal: number, sumCarefully: () => FacetSums): BodyIntegrals {
  const usualBound = computeErrorBound(usual, 'body', diagonal, blockedRoundings);
  const usualSurfaceBound = computeErrorBound(usual, 'surface', diagonal, blockedRoundings);
  const bodyStands = usualBound <= bodyTolerance;
  const surfaceStands = usualSurfaceBound <= surfaceTolerance;
  const careful = bodyStands && surfaceStands ? usual : sumCarefully();
  const body = bodyStands ? usual : careful;
  const bound = bodyStands ? usualBound : computeErrorBound(careful, 'body', diagonal, doubleDoubleRoundings);
  const surfaceBound = surfaceStands ? usualSurfaceBound : computeErrorBound(careful, 'surface', diagonal, doubleDoubleRoundings);
  const content = body.high[sumsOfBody] ?? 0;
  return {
    volume: finishIntegrals(body, 'body', stateBound(bound)),
    volumeSign: !(bound < 1) || diagonal < leastDiagonal ? 0 : content > 0 ? 1 : -1,
    surface: finishIntegrals(surfaceStands ? usual : careful, 'surface', stateBound(surfaceBound)),
  };
}

/**
 * Integrals over the body that facets of a welded mesh enclose, and over those facets, in the order of the file. What is not closed has no volume: then only
 * `surface` means something.
 *
 * @param origin a point in the box of the mesh, from which centroids are told
 * @param diagonal of that box: the natural scale of error bounds
 */
export function integrateBody(mesh: WeldedMesh, origin: Vector3, diagonal: number, selection: FacetSelection = {}): BodyIntegrals {
  return finishBody(sumSelection(usualKernel, mesh, origin, selection), diagonal, () => sumSelection(carefulKernel, mesh, origin, selection));
}

/** The same integrals with every facet read the other way round: volume and moments change their sign, the centroid stays. */
export function turnIntegrals({ content, centreFromOrigin, second, errorBound }: Integrals): Integrals {
  const negative = (value: number): number => 0 - value;
  const { xx, yy, zz, xy, yz, zx } = second;
  return {
    content: negative(content),
    centreFromOrigin,
    second: { xx: negative(xx), yy: negative(yy), zz: negative(zz), xy: negative(xy), yz: negative(yz), zx: negative(zx) },
    errorBound,
  };
}

/** Sums over facets of a welded mesh by a kernel, batch by batch. */
export function sumSelection(kernel: Kernel, mesh: WeldedMesh, origin: Vector3, { facets, turned, added }: FacetSelection = {}): FacetSums {
  const summing = kernel(origin);
  const own = facets === undefined ? mesh.facetCount : facets.length;
  const total = own + (added === undefined ? 0 : added.length / 9);
  const batch = new Float64Array(9 * Math.min(batchFacets, total));
  for (let begin = 0; begin < total; begin += batchFacets) {
    const count = Math.min(batchFacets, total - begin);
    for (let k = 0; k < count; k++) {
      if (begin + k < own) copyFacet(mesh, facets === undefined ? begin + k : (facets[begin + k] ?? 0), turned, batch, 9 * k);
      else if (added !== undefined) batch.set(added.subarray(9 * (begin + k - own), 9 * (begin + k - own) + 9), 9 * k);
    }
    summing.add(batch, count);
  }
  return summing.finish();
}

function copyFacet({ corners, coordinates }: WeldedMesh, facet: number, turned: Uint8Array | undefined, batch: Float64Array, to: number): void {
  const isTurned = turned !== undefined && turned[facet] === 1;
  for (let corner = 0; corner < 3; corner++) {
    const from = 3 * (corners[3 * facet + (isTurned && corner > 0 ? 3 - corner : corner)] ?? 0);
    batch[to + 3 * corner] = coordinates[from] ?? 0;
    batch[to + 3 * corner + 1] = coordinates[from + 1] ?? 0;
    batch[to + 3 * corner + 2] = coordinates[from + 2] ?? 0;
  }
}
