import { finding, measurement, measuringErrorCodes, measuringVersion, type Measurement, type MeasuringError } from '@masswright/contracts';
import * as geometry from '@masswright/geometry';
import { describe, expect, expectTypeOf, it } from 'vitest';

// geometry imports nothing of ours, so it has result types of its own; here, where both may be imported, they are held against the contracts.
describe('what geometry returns', () => {
  it('has the types of the contracts, neither more nor less', () => {
    expectTypeOf<geometry.Measurement>().toEqualTypeOf<Measurement>();
    // The worker has reasons of its own, which are not about the mesh.
    expectTypeOf<geometry.MeshErrorCode | 'file-missing' | 'gave-up' | 'took-too-long'>().toEqualTypeOf<MeasuringError['code']>();
    expect([...geometry.meshErrorCodes, 'file-missing', 'gave-up', 'took-too-long'].sort()).toEqual([...measuringErrorCodes].sort());
    expect([...geometry.findingKinds]).toEqual(finding.shape.kind.options);
    expect(measuringVersion).toBe(geometry.measuringVersion);
  });
  it('is accepted by the contracts as it is, of a sound mesh and of an open one', () => {
    const [a, b, c, d] = [[0, 0, 0], [1, 0, 0], [0, 1, 0], [0, 0, 1]] as const;
    const facets = [[a, c, b], [a, b, d], [b, c, d], [c, a, d]];
    for (const count of [4, 3]) {
      const found = geometry.measureMesh(geometry.writeBinaryStl(facets.slice(0, count).flat(2)));
      expect(measurement.parse(found)).toEqual(found);
      expect(found.soundness.defensible).toBe(count === 4);
    }
  });
});
