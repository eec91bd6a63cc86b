import type { FacetDoubt, IntegralChange, Vector3 } from '../../measurement';
import type { Corners } from '../../testing/shapes';
import { createWelder, type WeldedMesh } from '../../weld-corners';
import { estimateFacetDoubt } from '../estimate-facet-doubt';
import type { FacetDoubtOptions } from '../read-facets';
import type { SmoothBody } from './smooth-truth';
import { sumMesh } from './sum-mesh';

export function weld(corners: Corners): WeldedMesh {
  const count = corners.length / 9;
  const welder = createWelder(count);
  // The normals of the file are not asked for here.
  welder.add({ corners, count } as Parameters<typeof welder.add>[0]);
  return welder.finish();
}

/** One figure of a body: what the smooth one has more than the mesh, and what was said of it. */
export interface ComparedFigure {
  name: string;
  /** volume, area, volume · size, volume · size². */
  naturalScale: number;
  actual: number;
  predicted: number;
  spread: number[];
}

export function estimate(corners: Corners, options: Partial<FacetDoubtOptions> = {}): { doubt: FacetDoubt; centre: Vector3 } {
  const whole = sumMesh(corners, [0, 0, 0]);
  const centre: Vector3 = [whole.first[0] / whole.volume, whole.first[1] / whole.volume, whole.first[2] / whole.volume];
  const origin: Vector3 = [corners[0] ?? NaN, corners[1] ?? NaN, corners[2] ?? NaN];
  const centreFromOrigin: Vector3 = [centre[0] - origin[0], centre[1] - origin[1], centre[2] - origin[2]];
  return { doubt: estimateFacetDoubt(weld(corners), { origin, centreFromOrigin, sign: 1, ...options }), centre };
}

/** Volume, area, and the integrals of first and second degree about the mesh's centroid. */
export function comparePrediction({ corners, truth }: SmoothBody): ComparedFigure[] {
  const { doubt: { body, area }, centre } = estimate(corners);
  const mesh = sumMesh(corners, centre);
  const size = Math.cbrt(truth.volume);
  const off = truth.centre.map((coordinate, k) => coordinate - (centre[k] ?? NaN));
  const say = (name: string, naturalScale: number, actual: number, read: (change: IntegralChange) => number): ComparedFigure => ({ name, naturalScale, actual, predicted: read(body.correction), spread: body.spread.map(read) });
  const axes = { x: 0, y: 1, z: 2 } as const;
  return [
    say('volume', truth.volume, truth.volume - mesh.volume, (change) => change.content),
    { name: 'area', naturalScale: truth.area, actual: truth.area - mesh.area, predicted: area.correction, spread: area.spread },
    ...(['x', 'y', 'z'] as const).map((axis) => say(`first ${axis}`, truth.volume * size, truth.volume * (off[axes[axis]] ?? NaN) - mesh.first[axes[axis]], (change) => change.first[axes[axis]])),
    ...(['xx', 'yy', 'zz', 'xy', 'yz', 'zx'] as const).map((key) => {
      const [i, j] = [axes[key[0] as keyof typeof axes], axes[key[1] as keyof typeof axes]];
      const about = truth.second[key] + truth.volume * (off[i] ?? NaN) * (off[j] ?? NaN);
      return say(`second ${key}`, truth.volume * size * size, about - mesh.second[key], (change) => change.second[key]);
    }),
  ];
}

/** U = 2 √Σu² of the spread, each of it half the width of an interval, u = a/√3. */
export const expand = (spread: readonly number[]): number => 2 * Math.sqrt(spread.reduce((sum, half) => sum + (half * half) / 3, 0));
