/*
 * Where the text lane keeps its tables, the text and what it read, in bytes of its memory. The library reads and writes it at the same places: see
 * src/text-lane/lane-memory.ts.
 */
export const POSITION: usize = 0; // i32: how far the text was taken, from the beginning of the window
export const LINES: usize = 4; // i32: ends of lines in what was taken
export const VERTICES: usize = 8; // i32
export const POLYGONS: usize = 12; // i32
export const TENS: usize = 64; // 20 u64: powers of ten
export const EXACT_POWERS: usize = 256; // 23 f64: powers of ten that binary64 holds exactly
export const POWERS: usize = 1024; // 128 times two u64, high and low: the first 128 bits of powers of five, from LEAST_POWER on
export const WINDOW: usize = 4096; // 64 KiB of text; after it a byte 0, which is in no text
export const FIRST: usize = 73728; // f64: corners of facets, or vertices
export const SECOND: usize = 270336; // f64: normals of facets; or u32: four corners a polygon

export const LEAST_POWER: i32 = -64;
export const GREATEST_POWER: i32 = 63;
/** Stands for the fourth corner of a triangle. */
export const NO_CORNER: u32 = 0xffffffff;
/** Bytes of a word; longer ones are left to the reader, which has a limit on them. */
export const LONGEST_WORD: usize = 256;
