import { measureMesh, MeshError } from '@masswright/geometry';
import { describe, expect, it } from 'vitest';
import { makeDemoMeshes } from './meshes';

describe('the demo’s meshes', () => {
  it('are what the story says: six sound ones, of which one is turned, one that leaks, one that is cut off', async () => {
    const verdicts = (await makeDemoMeshes()).map(({ fileName, bytes }) => {
      try {
        const { soundness } = measureMesh(bytes);
        return [fileName, soundness.defensible ? (soundness.turned ? 'turned' : 'sound') : 'open'];
      } catch (error) {
        return [fileName, error instanceof MeshError ? error.code : 'crash'];
      }
    });
    expect(Object.fromEntries(verdicts)).toEqual({
      'drum-flange.stl': 'sound',
      'drum.stl': 'sound',
      'spindle.stl': 'sound',
      'crank-arm.stl': 'sound',
      'side-plate.stl': 'sound',
      'ratchet-wheel.stl': 'turned',
      'bearing-seat.stl': 'open',
      'spindle-old.stl': 'file-truncated',
    });
  });
});
