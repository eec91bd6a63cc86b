import type { Measurement, Setting, Vector3 } from '@masswright/contracts';
import { convertToMetres, type LengthUnit } from '@masswright/units';
import type { RigidBody } from './axis-moment';
import { findCombinedBody } from './combine-bodies';
import { resolveDensity, type ResolvedDensity } from './resolve-density';
import { checkShellDensities, computeBody, convertPoint, findShellBodies, type ShellBody } from './shell-bodies';

/** What a measurement weighs under a setting. */
export interface WeighedBody {
  volumeM3: number | null;
  centreOfMassM: Vector3 | null;
  density: ResolvedDensity;
  /** Null while there is no density, or no volume. */
  body: RigidBody | null;
  /** Of the volume that has the part's density, at unit density; null where there is none, or no volume. */
  uniform: RigidBody | null;
}

/**
 * Volume, centre and body of a measurement: of one density, or shell by shell. Where densities of shells are stated and can't be taken into account
 * (`checkShellDensities` says why), nothing that hangs on them is given.
 */
export function weighMeasurement(measurement: Measurement, setting: Setting, lengthUnit: LengthUnit): WeighedBody {
  const { volume, origin } = measurement;
  const volumeM3 = volume && convertToMetres(volume.content, lengthUnit, 3);
  if (volume === null || checkShellDensities(measurement, setting) !== undefined) {
    return { volumeM3, centreOfMassM: null, density: resolveDensity(null, setting), body: null, uniform: null };
  }
  const shells = findShellBodies(measurement, setting);
  if (shells !== undefined) return weighShells(shells, origin, setting, lengthUnit);
  const density = resolveDensity(volumeM3, setting);
  return {
    volumeM3,
    centreOfMassM: convertPoint(origin, volume.centreFromOrigin, lengthUnit),
    density,
    body: density.densityKgM3 === null ? null : computeBody(volume, origin, lengthUnit, density.densityKgM3),
    uniform: computeBody(volume, origin, lengthUnit, 1),
  };
}

function weighShells(shells: readonly ShellBody[], origin: Vector3, setting: Setting, lengthUnit: LengthUnit): WeighedBody {
  const own = shells.flatMap(({ volume, ownDensityKgM3 }) => (ownDensityKgM3 === null ? [] : [computeBody(volume, origin, lengthUnit, ownDensityKgM3)]));
  const plain = shells.filter(({ ownDensityKgM3 }) => ownDensityKgM3 === null);
  const uniform = findCombinedBody(plain.map(({ volume }) => computeBody(volume, origin, lengthUnit, 1))) ?? null;
  const density = resolveRest(uniform?.massKg ?? null, own.reduce((sum, { massKg }) => sum + massKg, 0), setting);
  const stands = plain.length === 0 || density.densityKgM3 !== null;
  const rest = plain.map(({ volume }) => computeBody(volume, origin, lengthUnit, density.densityKgM3 ?? 1));
  const whole = stands ? findCombinedBody([...own, ...rest]) : undefined;
  // A hollow of its own density in a body that was left out would weigh less than nothing.
  const body = whole !== undefined && whole.massKg > 0 ? whole : null;
  return { volumeM3: shells.reduce((sum, { volume }) => sum + convertToMetres(volume.content, lengthUnit, 3), 0), centreOfMassM: body?.centreOfMassM ?? null, density, body, uniform };
}

/** A weighing weighs all of the part: what shells of known density weigh is taken off before the rest's density is told. */
function resolveRest(restM3: number | null, ownKg: number, setting: Setting): ResolvedDensity {
  const { weighing } = setting;
  const rest = weighing === null ? null : { ...weighing, massKg: weighing.massKg - ownKg };
  const resolved = resolveDensity(rest !== null && !(rest.massKg > 0) ? null : restM3, { ...setting, weighing: rest });
  return { ...resolved, weighing: resolved.weighing && weighing && { ...resolved.weighing, massKg: weighing.massKg } };
}
