/* For benchmarks: what the tests do ten thousand times, a million times. */
export { makeDamagedFile, readDamagedFile, type Outcome } from './read-damaged';
export { makeSeedFiles, type SeedFile } from './seed-files';
