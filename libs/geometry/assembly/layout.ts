/*
 * Where the kernels' state lies in their memory, in bytes. The library reads and writes it at the same places: see src/kernel/kernel-memory.ts.
 */
export const HIGH: usize = 0; // 20 f64
export const LOW: usize = 160; // 20 f64
export const SIZES: usize = 320; // 4 f64
export const ORIGIN: usize = 352; // 3 f64
export const BOX: usize = 384; // least and greatest of 12 f32 as they stand in a facet: four v128 used of each, 96 bytes
export const SKETCH: usize = 480; // 2 u64
export const SECRETS: usize = 496; // 8 u64
export const REGISTERS: usize = 1024; // 32 double-double numbers of two lanes
export const FACETS: usize = 4096;
