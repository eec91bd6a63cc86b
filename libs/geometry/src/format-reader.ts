import type { DeclaredUnit, MeshFormat } from './measurement';
import { MeshError, spellCount, type MeshPlace } from './mesh-error';

/** Reads one format. What it throws and hands on depends on the bytes, never on how they were cut into chunks. */
export interface FormatReader {
  push(bytes: Uint8Array): void;
  /** Hands on the last facets and says what was seen beside them. */
  finish(): FileRemarks;
  readonly facetsRead: number;
}

/** How often something was seen in a file, and some of the facets concerned. */
export interface Remark {
  count: number;
  facets: number[];
}

/** What was noticed in a file beside its facets. */
export interface FileRemarks {
  solids: number;
  /** Bytes after the last facet of a binary file; fewer than one facet's. */
  trailingBytes: number;
  nonzeroAttributes: Remark;
  /** Polygons whose corners do not lie in one plane, each with the first facet that was cut from it. */
  nonPlanarPolygons: Remark;
  /** Polygons that are not convex and whose triangles overlap, which makes the area too large and leaves the volume as it is. */
  foldedPolygons: Remark;
  /** For each polygon that is not flat, half the difference of volume to the other way of fanning it; added up, in the mesh's unit cubed. */
  polygonVolume: number;
  /** Null where the file states none. */
  declaredUnit: DeclaredUnit | null;
  /** Names of the materials that the file gives its bodies, in its order, at most 20. */
  declaredMaterials: string[];
  /** What stands in the file and is no part of the body, in words: `objects of type "support"`. */
  leftOut: string[];
}

export const noRemarks = (): FileRemarks => ({
  solids: 1,
  trailingBytes: 0,
  nonzeroAttributes: { count: 0, facets: [] },
  nonPlanarPolygons: { count: 0, facets: [] },
  foldedPolygons: { count: 0, facets: [] },
  polygonVolume: 0,
  declaredUnit: null,
  declaredMaterials: [],
  leftOut: [],
});

/** A format as a sentence names it. */
export const formatNames: Readonly<Record<MeshFormat, string>> = {
  'stl-binary': 'binary STL',
  'stl-ascii': 'ASCII STL',
  obj: 'OBJ',
  'ply-ascii': 'ASCII PLY',
  'ply-binary': 'binary PLY',
  off: 'OFF',
  '3mf': '3MF',
  gltf: 'glTF',
  glb: 'binary glTF',
};

export function tooManyFacets(maximumFacets: number, format: MeshFormat, at: MeshPlace): MeshError {
  return new MeshError('too-many-facets', `The mesh (${formatNames[format]}) has more than ${spellCount(maximumFacets)} facets, the most that can be examined here. Reduce it or split it into parts.`, at);
}
