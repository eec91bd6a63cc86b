import { convertToMetres, lengthUnits, type LengthUnit } from '@masswright/units';
import type { FileFigures } from '@masswright/geometry/web-worker';

/** What the meshes would be, were their unit this one. */
export interface UnitEvidence {
  lengthUnit: LengthUnit;
  /** Longest sides of the bounding boxes. */
  smallestM: number;
  medianM: number;
  largestM: number;
  /** Null while no density is stated. */
  medianKg: number | null;
  totalKg: number | null;
  readsAs: string;
  /** Most parts that people make lie in this range; the others recede, and can be chosen all the same. */
  isPlausible: boolean;
}

/** What things of such a size are, from below; ours, and only a help to the eye. */
const kinds: readonly (readonly [belowM: number, words: string])[] = [
  [5e-5, 'dust'],
  [2e-3, 'grains of sand'],
  [1.2e-2, 'beads and small screws'],
  [0.1, 'parts between two fingers'],
  [0.6, 'hand-held parts'],
  [2.5, 'furniture, machine frames'],
  [12, 'vehicles, large machinery'],
  [60, 'ships and cranes'],
  [400, 'buildings'],
  [5000, 'dockyards and districts'],
  [Infinity, 'landscapes'],
];

/** Between a bead and a large machine. */
const plausible = { smallestM: 1e-3, largestM: 6 };

const middle = (sorted: readonly number[]): number => {
  const half = Math.floor(sorted.length / 2);
  return sorted.length % 2 === 1 ? (sorted[half] ?? 0) : ((sorted[half - 1] ?? 0) + (sorted[half] ?? 0)) / 2;
};

export const computeLongestSide = ({ boundingBox: { min, max } }: Pick<FileFigures, 'boundingBox'>): number => Math.max(max[0] - min[0], max[1] - min[1], max[2] - min[2]);

/** `hasInside`: false once it is known that the mesh encloses nothing; what was read as its volume then says nothing. */
export type ReadMesh = Pick<FileFigures, 'boundingBox' | 'volume'> & { hasInside?: boolean };

/** What each of the six units would make of the meshes, by the size of the unit; nothing while no mesh is read. */
export function computeUnitEvidence(meshes: readonly ReadMesh[], densityKgM3: number | null): UnitEvidence[] {
  if (meshes.length === 0) return [];
  const sides = meshes.map(computeLongestSide).sort((a, b) => a - b);
  const volumes = meshes.flatMap(({ volume, hasInside = true }) => (hasInside ? [volume] : [])).sort((a, b) => a - b);
  const total = volumes.reduce((sum, volume) => sum + volume, 0);
  const mass = (volume: number, unit: LengthUnit): number | null => (densityKgM3 === null || volumes.length === 0 ? null : densityKgM3 * convertToMetres(volume, unit, 3));
  return [...lengthUnits]
    .sort((a, b) => convertToMetres(1, a) - convertToMetres(1, b))
    .map((lengthUnit) => {
      const length = (side: number): number => convertToMetres(side, lengthUnit);
      const medianM = length(middle(sides));
      return {
        lengthUnit,
        smallestM: length(sides[0] ?? 0),
        medianM,
        largestM: length(sides.at(-1) ?? 0),
        medianKg: mass(middle(volumes), lengthUnit),
        totalKg: mass(total, lengthUnit),
        readsAs: kinds.find(([belowM]) => medianM < belowM)?.[1] ?? '',
        isPlausible: medianM >= plausible.smallestM && medianM <= plausible.largestM,
      };
    });
}

/** The mesh of middle size: it stands for the others in the picture. */
export function findMedianMesh<Mesh extends Pick<FileFigures, 'boundingBox'>>(meshes: readonly Mesh[]): Mesh | undefined {
  const sorted = [...meshes].sort((a, b) => computeLongestSide(a) - computeLongestSide(b));
  return sorted[Math.floor((sorted.length - 1) / 2)];
}
