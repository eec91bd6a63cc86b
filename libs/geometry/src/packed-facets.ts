/** A coordinate that is no finite number. */
export interface NotFinite {
  /** Index of the facet in the file, and of the coordinate among its nine. */
  facet: number;
  place: number;
  coordinate: number;
}

/**
 * Takes facets as a binary STL file has them, 50 bytes each, so that nothing has to be copied number by number. Both functions give a coordinate that is
 * not finite, where one was met, perhaps some facets late.
 */
export interface PackedFacetSink {
  add(bytes: Uint8Array, at: number, count: number): NotFinite | undefined;
  finish(): NotFinite | undefined;
}
