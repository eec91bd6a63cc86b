/* Where the text lane keeps things, in bytes of its memory: the same as assembly/text/layout.ts, which a test holds it against. */
export const laneLayout = { POSITION: 0, LINES: 4, VERTICES: 8, POLYGONS: 12, TENS: 64, EXACT_POWERS: 256, POWERS: 1024, WINDOW: 4096, FIRST: 73728, SECOND: 270336 } as const;

/** Bytes of text that lie in the memory at once. One of its lines is no longer. */
export const windowBytes = 65_536;
/** The shortest line of a vertex or a polygon, `v 1 2 3` with its end, has 8 bytes, so that there is room for what any window holds. */
export const mostStatements = windowBytes / 8;
/** A facet has more than 72 bytes of text. */
export const mostFacets = Math.floor(windowBytes / 72);
/** Stands for the fourth corner of a triangle. */
export const noCorner = 0xffffffff;
