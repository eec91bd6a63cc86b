import { describe, expect, it } from 'vitest';
import { createDraw, runSeed } from '../testing/draw';
import { examineCorners } from './testing/examine-corners';
import { plantedFaults } from './testing/plant-faults';
import { plantedShells } from './testing/plant-shells';

const meshes = 10_000;
const plants = [...plantedFaults, ...plantedShells];

describe('ten thousand meshes with and without planted faults', () => {
  const kinds = [...new Map(plants)];
  it.each(kinds)('no false verdict on %s', (name, plant) => {
    const share = plants.filter(([other]) => other === name).length;
    const first = plants.findIndex(([other]) => other === name);
    for (let k = 0; k < Math.ceil((meshes * share) / plants.length); k++) {
      // Each mesh can be made again by itself: FC_SEED and its number.
      const draw = createDraw(runSeed + 1_000_003 * (first + 1) + k);
      const mesh = plant(draw);
      try {
        mesh.check(examineCorners(mesh.corners, mesh.limit));
      } catch (error) {
        throw new Error(`${name}, mesh ${k} of FC_SEED=${runSeed}: ${error instanceof Error ? error.message : String(error)}`, { cause: error });
      }
    }
    expect(share).toBeGreaterThan(0);
  });
});
