import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { createSketch, drawSecrets } from './closedness-sketch';
import { createFacetPass, createReferencePass, type FacetPass } from './facet-pass';
import { beginSums, borrowKernel, putCorners, returnKernel } from './kernel/compiled-kernel';
import { kernelLayout } from './kernel/kernel-memory';
import type { Measurement } from './measurement';
import { createIntegralsPass, measureMesh, type IntegralsPass } from './measurer';
import { MeshError } from './mesh-error';
import { anyMesh } from './testing/arbitrary-meshes';
import * as shapes from './testing/shapes';
import { writeAsciiStl, writeBinaryStl } from './write-stl';

/** Pushes a file through as many passes as it takes, in pieces of given sizes. */
function integrate(bytes: Uint8Array, sizes: readonly number[] = [bytes.length]): Measurement {
  let pass: IntegralsPass = createIntegralsPass({ sizeBytes: bytes.length });
  for (;;) {
    for (let at = 0, turn = 0; at < bytes.length; turn++) {
      const size = Math.max(1, sizes[turn % sizes.length] ?? 1);
      pass.push(bytes.subarray(at, at + size));
      at += size;
    }
    const end = pass.finish();
    if (end.kind === 'measured') return end.measurement;
    ({ pass } = end);
  }
}

const figuresOf = ({ volume, surface, origin, boundingBox, facets }: Measurement) => ({ volume, surface, origin, boundingBox, facets });

function takeCorners(pass: FacetPass, corners: shapes.Corners): void {
  pass.takeBatch({ corners, normals: new Float64Array(corners.length / 3), count: corners.length / 9, first: 0 });
}

describe('a reading for the integrals alone', () => {
  it('gives the bits of the whole measurement, of binary and of text files, whatever the sizes of the pieces', () => {
    fc.assert(
      fc.property(anyMesh, fc.array(fc.integer({ min: 1, max: 700 }), { minLength: 1, maxLength: 5 }), fc.boolean(), (mesh, sizes, inText) => {
        const bytes = inText ? writeAsciiStl(mesh) : writeBinaryStl(mesh);
        const whole = measureMesh(bytes);
        const quick = integrate(bytes, sizes);
        fc.pre(whole.shells?.length === 1 && whole.soundness.closed === true);
        expect(figuresOf(quick)).toEqual(figuresOf(whole));
        expect(quick.soundness).toMatchObject({ closed: true, oriented: true, outward: whole.soundness.outward, turned: whole.soundness.turned, defensible: whole.soundness.defensible });
      }),
      { numRuns: 150 },
    );
  });

  it('goes over the file again where rounding did too much, and then gives the same bits', () => {
    const needle = writeBinaryStl(shapes.rotate(shapes.makeTube(5, 4.99, 100, 48), shapes.makeRotation(0.3, 0.7, 1.1)));
    const pass = createIntegralsPass({ sizeBytes: needle.length });
    pass.push(needle);
    expect(pass.finish().kind).toBe('again');
    expect(figuresOf(integrate(needle, [4000]))).toEqual(figuresOf(measureMesh(needle)));
  });

  it('finds a gap of one unit in the last place, a missing and a turned facet, in any mesh', () => {
    fc.assert(
      fc.property(anyMesh, fc.nat(), fc.constantFrom('moved', 'missing', 'turned'), (mesh, place, fault) => {
        const corners = shapes.roundToBinary32(mesh);
        const index = place % (corners.length / 9);
        fc.pre(measureMesh(writeBinaryStl(corners)).soundness.oriented);
        const facet = corners.slice(9 * index, 9 * index + 9);
        const [a, b, c] = [0, 3, 6].map((at) => facet.subarray(at, at + 3).join());
        fc.pre(a !== b && b !== c && c !== a);
        const bytes = writeBinaryStl(fault === 'missing' ? shapes.join(corners.slice(0, 9 * index), corners.slice(9 * index + 9)) : corners);
        const at = 84 + 50 * index + 12;
        if (fault === 'moved') bytes[at] = (bytes[at] ?? 0) ^ 1;
        if (fault === 'turned') bytes.set([...bytes.subarray(at + 12, at + 24), ...bytes.subarray(at, at + 12)], at);
        expect(integrate(bytes).soundness).toMatchObject({ closed: null, oriented: false, defensible: false, boundaryEdges: null });
        expect(integrate(bytes).volume).toBeNull();
      }),
      { numRuns: 300 },
    );
  });

  it('never doubts a mesh whose edges cancel: +0 and -0 are one place', () => {
    const block = writeBinaryStl(shapes.makeBlock([-1, 0, 0], [1, 1, 1]));
    const view = new DataView(block.buffer);
    for (let at = 84 + 12; at < block.length; at += 50) for (let k = 0; k < 9; k += 2) if (view.getFloat32(at + 4 * k, true) === 0) view.setFloat32(at + 4 * k, -0, true);
    expect(integrate(block).soundness.oriented).toBe(true);
    expect(integrate(block).boundingBox).toEqual({ min: [-1, 0, 0], max: [1, 1, 1] });
  });

  it('names the coordinate that is not finite as the whole measurement does, wherever it stands', () => {
    const sphere = writeBinaryStl(shapes.makeSphere(5, 150));
    const facets = (sphere.length - 84) / 50;
    expect(facets).toBeGreaterThan(8192);
    for (const [facet, value] of [[0, NaN], [4096, Infinity], [facets - 1, -Infinity]] as const) {
      const bytes = sphere.slice();
      new DataView(bytes.buffer).setFloat32(84 + 50 * facet + 12 + 20, value, true);
      const errors = [() => integrate(bytes, [1000]), () => measureMesh(bytes)].map((measure) => {
        try {
          return measure();
        } catch (error) {
          return error instanceof MeshError ? { code: error.code, message: error.message, at: error.at } : error;
        }
      });
      expect(errors[0]).toMatchObject({ code: 'number-not-finite' });
      expect(errors[0]).toEqual(errors[1]);
    }
  });
});

describe('the sketch of the edges', () => {
  // Coordinates whose bits differ in few places are what weak mixing would confuse: one draw of secrets in some thousand then misses faults.
  it('finds every fault of blocks between powers of two, whatever the secrets', () => {
    const kernel = borrowKernel();
    if (kernel === undefined) throw new Error('The compiled kernel does not run here.');
    const view = new DataView(kernel.bytes.buffer, kernel.bytes.byteOffset);
    const at = kernelLayout.SKETCH >> 3;
    const cancels = (facets: readonly (readonly number[])[]): boolean => {
      kernel.words.fill(0n, at, at + 2);
      for (const [index, facet] of facets.entries()) for (const [place, coordinate] of facet.entries()) view.setFloat32(50 * index + 12 + 4 * place, coordinate, true);
      kernel.sketchStl(facets.length);
      return kernel.words[at] === 0n && kernel.words[at + 1] === 0n;
    };
    let missed = 0;
    for (let turn = 0; turn < 6_000; turn++) {
      kernel.words.set(drawSecrets(), kernelLayout.SECRETS >> 3);
      const [x, y, z] = [2 ** (turn % 9), 2 ** (turn % 5), 2 ** -(turn % 20)];
      const block = shapes.makeBlock([-x, -y, -z], [x, y, z]);
      const facets = Array.from({ length: 12 }, (_, index) => Array.from(block.subarray(9 * index, 9 * index + 9)));
      expect(cancels(facets)).toBe(true);
      for (const [index, facet] of facets.entries()) {
        const faulty = [facets.filter((one) => one !== facet), [...facets, facet], ...facet.map((coordinate, place) => facets.map((one, k) => (k === index ? one.with(place, -coordinate) : one)))];
        missed += faulty.filter(cancels).length;
      }
    }
    returnKernel(kernel);
    expect(missed).toBe(0);
  });

  it('is the same compiled and in plain words, given the same secrets', () => {
    fc.assert(
      fc.property(anyMesh, (corners) => {
        const secrets = drawSecrets();
        const plain = createSketch(secrets);
        plain.add(corners, corners.length / 9);
        const kernel = borrowKernel();
        if (kernel === undefined) throw new Error('The compiled kernel does not run here.');
        beginSums(kernel, [0, 0, 0]);
        const at = kernelLayout.SKETCH >> 3;
        kernel.words.fill(0n, at, at + 2);
        kernel.words.set(secrets, kernelLayout.SECRETS >> 3);
        putCorners(kernel, corners, 0, corners.length / 9, [0, 0, 0]);
        kernel.sketchCorners(corners.length / 9);
        expect([kernel.words[at], kernel.words[at + 1]]).toEqual([...plain.sums]);
        returnKernel(kernel);
      }),
      { numRuns: 50 },
    );
  });

  it('is what the reading without the compiled kernel goes by', () => {
    const torus = shapes.makeTorus(5, 1, 12);
    for (const [corners, cancel] of [[torus, true], [torus.slice(9), false]] as const) {
      const [reference, compiled] = [createReferencePass(), createFacetPass()].map((pass) => {
        takeCorners(pass, corners);
        return pass.finish();
      });
      expect(reference?.edgesCancel).toBe(cancel);
      expect(reference).toEqual(compiled);
    }
  });
});
