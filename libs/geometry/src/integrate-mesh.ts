import { batchFacets } from './facet-batch';
import { createFacetSums, sumsOfBody, sumsOfSurface, type FacetIntegrator, type FacetSums } from './facet-sums';
import { blockedRoundings, integrateBlocked } from './integrate-blocked';
import { doubleDoubleRoundings, integrateDoubleDouble } from './integrate-double-double';
import type { Vector3 } from './measurement';
import type { WeldedMesh } from './weld-corners';

/**
 * Bound on the rounding of the volume, relative to it, above which the careful kernel takes over. The centre (relative to the diagonal) and the
 * moments (to volume times diagonal²) lose up to four times as much, which keeps them within 1e-13.
 */
const bodyTolerance = 2e-14;
/** The same for the area. It is looser, since long thin facets are common and tolerances need no more. */
const surfaceTolerance = 1e-12;

/** A body whose box is smaller cannot be integrated: fifth powers would leave the range of binary64. */
const leastExtent = 1e-45;

/** 2⁻⁵³ and 2⁻¹⁰⁰. */
const blockedUnit = blockedRoundings * 1.1102230246251565e-16;
const doubleDoubleUnit = doubleDoubleRoundings * 7.888609052210118e-31;

export interface ChosenSums {
  body: FacetSums;
  /** Sign of the volume as stored; 0 where it is within its rounding bound of zero. */
  sign: -1 | 0 | 1;
  surface: FacetSums;
}

/** Keeps the sums of the usual kernel where their rounding is small enough, and sums again by the careful one where it is not. */
export function chooseSums(blocked: FacetSums, mesh: WeldedMesh, origin: Vector3, extent: number): ChosenSums {
  const careful = lazily(() => integrateWith(integrateDoubleDouble, mesh, origin));
  const bodyStands = blockedUnit * blocked.determinantSize <= bodyTolerance * sizeOf(blocked, sumsOfBody);
  const surfaceStands = bodyStands && blockedUnit * blocked.crossSize <= surfaceTolerance * sizeOf(blocked, sumsOfSurface);
  const body = bodyStands ? blocked : careful();
  const bound = bodyStands ? 0 : doubleDoubleUnit * body.determinantSize;
  const volume = body.high[sumsOfBody] ?? 0;
  return {
    body,
    sign: extent < leastExtent || Math.abs(volume) <= bound ? 0 : volume > 0 ? 1 : -1,
    surface: surfaceStands ? blocked : careful(),
  };
}

/** For a mesh that is not closed: its surface, and the sign of the volume about the middle of the box. */
export function chooseOpenSums(blocked: FacetSums, mesh: WeldedMesh, origin: Vector3, middle: Vector3): ChosenSums {
  const surfaceStands = blockedUnit * blocked.crossSize <= surfaceTolerance * sizeOf(blocked, sumsOfSurface);
  const about = integrateWith(integrateBlocked, mesh, middle);
  const volume = about.high[sumsOfBody] ?? 0;
  return {
    body: blocked,
    sign: Math.abs(volume) <= blockedUnit * about.determinantSize ? 0 : volume > 0 ? 1 : -1,
    surface: surfaceStands ? blocked : integrateWith(integrateDoubleDouble, mesh, origin),
  };
}

const sizeOf = (sums: FacetSums, place: number): number => Math.abs((sums.high[place] ?? 0) + (sums.low[place] ?? 0));

function lazily<Value extends object>(create: () => Value): () => Value {
  let value: Value | undefined;
  return () => (value ??= create());
}

/** Sums over a welded mesh, in the order of its facets. */
export function integrateWith(integrate: FacetIntegrator, mesh: WeldedMesh, origin: Vector3): FacetSums {
  const sums = createFacetSums();
  const batch = new Float64Array(9 * batchFacets);
  for (let begin = 0; begin < mesh.facetCount; begin += batchFacets) {
    const count = Math.min(batchFacets, mesh.facetCount - begin);
    for (let corner = 0; corner < 3 * count; corner++) {
      const at = 3 * (mesh.corners[3 * begin + corner] ?? 0);
      batch[3 * corner] = mesh.coordinates[at] ?? 0;
      batch[3 * corner + 1] = mesh.coordinates[at + 1] ?? 0;
      batch[3 * corner + 2] = mesh.coordinates[at + 2] ?? 0;
    }
    integrate(sums, origin, batch, count);
  }
  return sums;
}
