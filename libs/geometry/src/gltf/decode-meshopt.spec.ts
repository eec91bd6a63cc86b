import fc from 'fast-check';
import { MeshoptEncoder } from 'meshoptimizer/encoder';
import { beforeAll, describe, expect, it } from 'vitest';
import { createRandom } from '../testing/fuzzing/random';
import { applyExponentialFilter, decodeMeshoptAttributes } from './decode-meshopt-attributes';
import { decodeMeshoptIndices, decodeMeshoptTriangles } from './decode-meshopt-indices';

beforeAll(() => MeshoptEncoder.ready);

/** Elements that follow one another more or less closely, so that every way of packing comes up. */
const anyElements = fc.record({
  stride: fc.constantFrom(4, 8, 12, 16, 40, 100, 256),
  count: fc.integer({ min: 1, max: 700 }),
  step: fc.constantFrom(0, 1, 3, 20, 255),
  seed: fc.nat(),
});

function makeElements({ stride, count, step, seed }: { stride: number; count: number; step: number; seed: number }): Uint8Array {
  const random = createRandom(seed);
  const bytes = new Uint8Array(count * stride);
  for (let at = 0; at < bytes.length; at++) bytes[at] = (bytes[at - stride] ?? 0) + random.below(random.oneIn(97) ? 256 : step + 1);
  return bytes;
}

describe('what the package meshoptimizer has packed', () => {
  it('as attributes, in either version and at any level, comes out byte for byte', () => {
    fc.assert(
      fc.property(anyElements, fc.constantFrom(0, 1), fc.integer({ min: 0, max: 3 }), (choices, version, level) => {
        const bytes = makeElements(choices);
        const packed = MeshoptEncoder.encodeVertexBufferLevel(bytes, choices.count, choices.stride, level, version);
        expect(packed[0]).toBe(0xa0 + version);
        expect(Buffer.compare(decodeMeshoptAttributes(packed, choices.count, choices.stride) ?? new Uint8Array(0), bytes)).toBe(0);
      }),
      { numRuns: 150 },
    );
  });

  it('as floating numbers that run along, in the newer version, comes out byte for byte', () => {
    for (const count of [1, 15, 16, 17, 300, 1000]) {
      const numbers = Float32Array.from({ length: 3 * count }, (_, k) => Math.sin(k / 50) * 10 + (k % 3) * 1000);
      const words = Uint16Array.from({ length: 2 * count }, (_, k) => 30_000 + 100 * k);
      for (const array of [numbers, words]) {
        const bytes = new Uint8Array(array.buffer);
        const stride = bytes.length / count;
        expect(decodeMeshoptAttributes(MeshoptEncoder.encodeVertexBufferLevel(bytes, count, stride, 3, 1), count, stride)).toEqual(bytes);
      }
    }
  });

  it('as triangles comes out as the same triangles, each perhaps begun at another corner', () => {
    fc.assert(
      fc.property(fc.array(fc.tuple(fc.nat(60), fc.nat(60), fc.nat(100_000)), { minLength: 1, maxLength: 400 }), fc.boolean(), (random, ordered) => {
        const triangles = random.map(([a, b, far], k) => (ordered ? [k, k + 1, k + 2] : [a, b, far % 7 === 0 ? far : far % 61]));
        const packed = MeshoptEncoder.encodeIndexBuffer(new Uint8Array(Uint32Array.from(triangles.flat()).buffer), 3 * triangles.length, 4);
        const found = decodeMeshoptTriangles(packed, 3 * triangles.length);
        const turnRound = ([a = 0, b = 0, c = 0]: number[]): string => [[a, b, c], [b, c, a], [c, a, b]].map((turned) => turned.join(' ')).sort()[0] ?? '';
        expect(triangles.map((_, k) => turnRound(Array.from(found?.subarray(3 * k, 3 * k + 3) ?? [])))).toEqual(triangles.map(turnRound));
      }),
      { numRuns: 150 },
    );
  });

  it('as a sequence of indices comes out as it was', () => {
    fc.assert(
      fc.property(fc.array(fc.oneof(fc.nat(100), fc.nat(1_000_000)), { minLength: 1, maxLength: 500 }), (indices) => {
        const packed = MeshoptEncoder.encodeIndexSequence(new Uint8Array(Uint32Array.from(indices).buffer), indices.length, 4);
        expect(Array.from(decodeMeshoptIndices(packed, indices.length) ?? [])).toEqual(indices);
      }),
      { numRuns: 100 },
    );
  });

  it('by the exponential filter comes out within its digits, and so does any power of 2', () => {
    const numbers = Float32Array.from([1, -1, 0.1, 123.456, -7e-9, 3e20, 0]);
    const bytes = Uint8Array.from(MeshoptEncoder.encodeFilterExp(numbers, numbers.length, 4, 23));
    applyExponentialFilter(bytes);
    new Float32Array(bytes.buffer).forEach((value, k) => expect(Math.abs(value - (numbers[k] ?? NaN))).toBeLessThanOrEqual(Math.abs(numbers[k] ?? NaN) * 2e-6));
    for (const exponent of [-128, -100, -1, 0, 100, 126]) {
      const stored = new Uint8Array(Int32Array.of((exponent << 24) | 3).buffer);
      applyExponentialFilter(stored);
      expect(new Float32Array(stored.buffer)[0]).toBe(3 * 2 ** exponent);
    }
  });

  it('and was cut off, lengthened or damaged at its ends is refused', () => {
    const bytes = makeElements({ stride: 12, count: 100, step: 3, seed: 1 });
    const [attributes, triangles, indices] = [MeshoptEncoder.encodeVertexBuffer(bytes, 100, 12), MeshoptEncoder.encodeIndexBuffer(new Uint8Array(Uint32Array.of(0, 1, 2, 2, 1, 3).buffer), 6, 4), MeshoptEncoder.encodeIndexSequence(new Uint8Array(Uint32Array.of(5, 9, 700).buffer), 3, 4)];
    const changes = [(packed: Uint8Array): Uint8Array => packed.subarray(0, -1), (packed: Uint8Array): Uint8Array => Uint8Array.from([...packed, 0]), (packed: Uint8Array): Uint8Array => packed.map((byte, k) => (k === 0 ? byte ^ 0x40 : byte)), (): Uint8Array => new Uint8Array(0)];
    for (const change of changes) {
      expect(decodeMeshoptAttributes(change(attributes), 100, 12)).toBeUndefined();
      expect(decodeMeshoptTriangles(change(triangles), 6)).toBeUndefined();
      expect(decodeMeshoptIndices(change(indices), 3)).toBeUndefined();
    }
    expect(decodeMeshoptAttributes(attributes, 100, 6)).toBeUndefined();
    expect(decodeMeshoptTriangles(triangles, 3e9)).toBeUndefined();
    expect(decodeMeshoptIndices(indices, 3e9)).toBeUndefined();
  });
});
