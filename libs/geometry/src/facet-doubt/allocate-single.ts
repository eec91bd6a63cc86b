import { allocate } from '../grow-array';

/** Numbers in binary32: seven digits are enough for a prediction, and what is equal stays equal. Half the memory, or a refusal in words. */
export function allocateSingle(length: number): Float32Array<ArrayBuffer> {
  return new Float32Array(allocate(() => new Uint32Array(length)).buffer);
}
