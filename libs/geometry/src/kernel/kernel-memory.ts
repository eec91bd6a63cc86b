/* Where the compiled kernels keep their state, in bytes of their memory: the same as assembly/layout.ts, which a test holds it against. */
export const kernelLayout = { HIGH: 0, LOW: 160, SIZES: 320, ORIGIN: 352, BOX: 384, SKETCH: 480, SECRETS: 496, REGISTERS: 1024, FACETS: 4096 } as const;

/** Facets that lie in the memory at once. */
export const kernelFacets = 4096;
