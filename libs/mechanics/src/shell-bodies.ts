import type { Integrals, Measurement, Setting, Shell, Vector3 } from '@masswright/contracts';
import { convertToMetres, type LengthUnit } from '@masswright/units';
import type { RigidBody } from './axis-moment';
import { convertVector } from './body-vectors';
import { computeTensorFromSecondMoments, scaleTensor, type Tensor } from './tensor';

/** Mass, centre and central tensor of a uniform body in SI, from its integrals in the mesh's unit at unit density. */
export function computeBody(volume: Integrals, origin: Vector3, lengthUnit: LengthUnit, densityKgM3: number): RigidBody {
  return {
    massKg: densityKgM3 * convertToMetres(volume.content, lengthUnit, 3),
    centreOfMassM: convertPoint(origin, volume.centreFromOrigin, lengthUnit),
    inertiaAtCentreOfMassKgM2: computeCentralTensor(volume, lengthUnit, densityKgM3),
  };
}

function computeCentralTensor({ second }: Integrals, lengthUnit: LengthUnit, densityKgM3: number): Tensor {
  const inMeshUnit = computeTensorFromSecondMoments(second);
  const inMetres: Tensor = {
    xx: convertToMetres(inMeshUnit.xx, lengthUnit, 5),
    yy: convertToMetres(inMeshUnit.yy, lengthUnit, 5),
    zz: convertToMetres(inMeshUnit.zz, lengthUnit, 5),
    xy: convertToMetres(inMeshUnit.xy, lengthUnit, 5),
    yz: convertToMetres(inMeshUnit.yz, lengthUnit, 5),
    zx: convertToMetres(inMeshUnit.zx, lengthUnit, 5),
  };
  return scaleTensor(inMetres, densityKgM3);
}

/** A position given as an exact vertex and an offset from it. */
export function convertPoint(origin: Vector3, offset: Vector3, unit: LengthUnit): Vector3 {
  return convertVector([origin[0] + offset[0], origin[1] + offset[1], origin[2] + offset[2]], unit);
}

/** A shell that is there: its integrals, and its density where that is not the part's. */
export interface ShellBody {
  volume: Integrals;
  /** Null where it has the part's density. */
  ownDensityKgM3: number | null;
}

/**
 * Why densities of shells can't be taken into account; undefined where they can, or where there are none.
 */
export function checkShellDensities({ shells, soundness }: Pick<Measurement, 'shells' | 'soundness'>, { shellDensities = [] }: Pick<Setting, 'shellDensities'>): string | undefined {
  if (shellDensities.length === 0) return undefined;
  if (!shells) return 'The shells of this mesh were not examined, so none can have a density of its own or be left out.';
  if (soundness.cavities === null) return 'Which shells of this mesh lie in which was not examined, so none can have a density of its own or be left out.';
  if (soundness.shells === null || shells.length < soundness.shells) return `Only ${shells.length} shells of this mesh are listed, so none can have a density of its own or be left out.`;
  const seen = new Set<number>();
  for (const { shell } of shellDensities) {
    if (shells[shell] === undefined) return `There is no shell ${shell + 1}: the mesh has ${shells.length}.`;
    if (seen.has(shell)) return `Shell ${shell + 1} is given two densities.`;
    seen.add(shell);
  }
  const open = shells.findIndex(({ volume }) => volume === null);
  if (open !== -1) return `Shell ${open + 1} is open and has no volume, so no shell can have a density of its own or be left out.`;
  return undefined;
}

/**
 * The shells that are not left out. A cavity goes with the shell around it, unless it is named itself: left out, it is filled. Undefined where the whole
 * is of one density, or where `checkShellDensities` has something to say.
 */
export function findShellBodies(measurement: Measurement, setting: Pick<Setting, 'shellDensities'>): ShellBody[] | undefined {
  const { shells } = measurement;
  const stated = new Map((setting.shellDensities ?? []).map(({ shell, densityKgM3 }) => [shell, densityKgM3]));
  if (stated.size === 0 || !shells || checkShellDensities(measurement, setting) !== undefined) return undefined;
  return shells.flatMap((shell, index): ShellBody[] => {
    const own = findDensity(shells, stated, shell, index);
    return shell.volume === null || own === null ? [] : [{ volume: shell.volume, ownDensityKgM3: own ?? null }];
  });
}

/** Undefined is the part's own density, null is left out. */
function findDensity(shells: readonly Shell[], stated: ReadonlyMap<number, number | null>, shell: Shell, index: number): number | null | undefined {
  if (stated.has(index)) return stated.get(index);
  const around = shell.kind === 'cavity' && shell.inside !== null ? shells[shell.inside] : undefined;
  // A cavity lies in a body, never in a cavity: one step is enough.
  return around === undefined || shell.inside === null ? undefined : stated.get(shell.inside);
}

