/**
 * What reading a file may cost. Files come from anywhere: whatever they hold or claim, memory stays within a small multiple of the bytes that
 * arrived, and a file that goes beyond a limit is refused as soon as it does. One limit a thing that could otherwise grow without end.
 */
export interface ReadingLimits {
  /** Facets of the mesh; polygons count as the triangles that they are cut into. Refused as `too-many-facets`. */
  maximumFacets: number;
  /** Meshes of more facets are measured as far as constant memory allows (`createIntegralsPass`), and not examined. */
  maximumExaminedFacets: number;
  /** Vertices of a format that lists them apart from its facets. Refused as `too-many-vertices`. */
  maximumVertices: number;
  /** Corners of one polygon. Refused as `polygon-too-large`. */
  maximumPolygonCorners: number;
  /** Bytes of a number or keyword. Refused as `syntax-invalid`. */
  maximumWordBytes: number;
  /** Bytes of a line; in ASCII STL, which may stand on one line as a whole, without the facets. Refused as `syntax-invalid`. */
  maximumLineBytes: number;
  /** Bytes of a header in words, where a format has one that is kept until it ends. Refused as `syntax-invalid`. */
  maximumHeaderBytes: number;
  /** Bytes of a format that has to be there as a whole before it can be read. Refused as `too-large-expanded`. */
  maximumKeptBytes: number;
  /** Bytes of a text that is taken apart as a whole, and then takes a multiple of its length. Refused as `too-large-expanded`. */
  maximumJsonBytes: number;
  /** Facets for each byte of a file that may place one piece many times, from `freePlacedFacets` on. Refused as `too-large-expanded`. */
  maximumFacetsPerByte: number;
  /** So many facets may come of however few bytes. */
  freePlacedFacets: number;
  /** How deep elements, objects or nodes may stand in one another. Refused as `syntax-invalid`. */
  maximumDepth: number;
  /** Bytes that a packed file holds. Refused as `too-large-expanded`. */
  maximumExpandedBytes: number;
  /** How many times as long as its packed bytes a packed file may become, from `freeExpansionBytes` on. Refused as `too-large-expanded`. */
  maximumExpansion: number;
  /** So many bytes may come of however few packed ones. */
  freeExpansionBytes: number;
}

export const defaultLimits: Readonly<ReadingLimits> = {
  // 2.5 GB of binary STL.
  maximumFacets: 50_000_000,
  // 250 MB of binary STL; some 800 MB of memory while its edges are sorted.
  maximumExaminedFacets: 4_000_000,
  // A closed mesh has half as many vertices as facets; seams may list one several times. 24 bytes each: 480 MB.
  maximumVertices: 20_000_000,
  // A flat face with a fine outline has thousands. Its corners are kept until it ends: 256 kB.
  maximumPolygonCorners: 65_536,
  // The longest decimal of a binary64 number that anything prints has fewer than 400 digits.
  maximumWordBytes: 512,
  // The largest polygon fits, with three numbers of 20 digits a corner. Lines are not kept, so this is about time.
  maximumLineBytes: 4 << 20,
  // Headers have some dozen lines, and room for comments.
  maximumHeaderBytes: 1 << 20,
  // 25 million facets as binary glTF with two bytes an index, or some hundred million bytes of 3MF many times over.
  maximumKeptBytes: 500_000_000,
  // Its numbers and objects take up to twenty times as much. Binary data may stand in it as text: 75 MB of it.
  maximumJsonBytes: 100_000_000,
  // A hundred copies of a finely cut part, in the densest way of writing it.
  maximumFacetsPerByte: 10,
  freePlacedFacets: 1_000_000,
  // Assemblies are some ten deep.
  maximumDepth: 100,
  // The most facets in ASCII STL, at 250 bytes each; half a minute of expanding.
  maximumExpandedBytes: 5_000_000_000,
  // Meshes become a twentieth at best; the most that gzip can make of anything is a thousandth.
  maximumExpansion: 100,
  freeExpansionBytes: 4 << 20,
};

/** The limits that a caller gives, and the usual ones for the rest. */
export function completeLimits(given: Partial<ReadingLimits>): ReadingLimits {
  const limits: ReadingLimits = { ...defaultLimits };
  for (const name of Object.keys(defaultLimits) as (keyof ReadingLimits)[]) limits[name] = given[name] ?? limits[name];
  return limits;
}
