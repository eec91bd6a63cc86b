import type { Integrals, Measurement, Setting, StatementRecord, Symmetric3, Vector3 } from '@masswright/contracts';
import { convertToMetres, type LengthUnit } from '@masswright/units';
import { computeAxisMoment, computeRadiusOfGyration, resolveAxis, type Line, type RigidBody } from './axis-moment';
import { classifyAxes, computePrincipalAxes } from './principal-axes';
import { resolveDensity } from './resolve-density';
import { computeTensorFromSecondMoments, scaleTensor, type Tensor } from './tensor';

export interface StatementSource {
  /** Name of the file, as people know it. */
  file: string;
  sha256: string;
}

/**
 * Everything that a measurement says under a setting: the record of a statement. Undefined while the unit is not stated, since nothing can be said
 * in metres then. Volume, centre and what follows are null where the mesh is not defensible; mass and what follows where no density is stated.
 * The browser and the server call this same function, so that both have the same bits.
 */
export function computeStatement(measurement: Measurement, setting: Setting, { file, sha256 }: StatementSource): StatementRecord | undefined {
  const { lengthUnit } = setting;
  if (lengthUnit === null) return undefined;
  const { volume, surface, soundness, boundingBox } = measurement;
  const centreOfMassM = volume && convertPoint(measurement.origin, volume.centreFromOrigin, lengthUnit);
  const volumeM3 = volume && convertToMetres(volume.content, lengthUnit, 3);
  const { densityKgM3, weighing } = resolveDensity(volumeM3, setting);
  const body = volume && densityKgM3 !== null ? computeBody(volume, measurement.origin, lengthUnit, densityKgM3) : null;
  const principal = body && computePrincipalAxes(body.inertiaAtCentreOfMassKgM2);
  const line = resolveAxis(setting.axis, { centreOfMassM, principalAxes: principal?.axes ?? null });
  return {
    schema: 'masswright.statement/1',
    file,
    sha256,
    format: measurement.format,
    lengthUnit,
    facets: measurement.facets,
    measuringVersion: measurement.measuringVersion,
    soundness,
    material: setting.material?.name ?? null,
    densityKgM3,
    weighing,
    volumeM3,
    areaM2: convertToMetres(surface.content, lengthUnit, 2),
    massKg: body?.massKg ?? null,
    boundingBoxM: { min: convertVector(boundingBox.min, lengthUnit), max: convertVector(boundingBox.max, lengthUnit) },
    frame: 'mesh',
    centreOfMassM,
    inertiaAtCentreOfMassKgM2: body && { ...body.inertiaAtCentreOfMassKgM2, offDiagonals: '-∫xy dm' },
    principalMomentsKgM2: principal?.moments ?? null,
    principalAxes: principal?.axes ?? null,
    axes: principal && classifyAxes(principal.moments),
    radiiOfGyrationM: body && principal && mapVector(principal.moments, (moment) => computeRadiusOfGyration(moment, body.massKg)),
    aboutAxis: body && line ? computeAboutAxis(body, line) : null,
  };
}

/** Mass, centre and central tensor of a uniform body in SI, from its integrals in the mesh's unit at unit density. */
export function computeBody(volume: Integrals, origin: Vector3, lengthUnit: LengthUnit, densityKgM3: number): RigidBody {
  return {
    massKg: densityKgM3 * convertToMetres(volume.content, lengthUnit, 3),
    centreOfMassM: convertPoint(origin, volume.centreFromOrigin, lengthUnit),
    inertiaAtCentreOfMassKgM2: computeCentralTensor(volume.second, lengthUnit, densityKgM3),
  };
}

function computeCentralTensor(second: Symmetric3, lengthUnit: LengthUnit, densityKgM3: number): Tensor {
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

function computeAboutAxis(body: RigidBody, line: Line): NonNullable<StatementRecord['aboutAxis']> {
  const { inertiaKgM2, radiusOfGyrationM } = computeAxisMoment(body, line);
  return { ...line, inertiaKgM2, radiusOfGyrationM };
}

function mapVector([x, y, z]: Vector3, by: (element: number) => number): Vector3 {
  return [by(x), by(y), by(z)];
}

function convertVector(vector: Vector3, unit: LengthUnit): Vector3 {
  return mapVector(vector, (element) => convertToMetres(element, unit));
}

/** A position given as an exact vertex and an offset from it. */
function convertPoint(origin: Vector3, offset: Vector3, unit: LengthUnit): Vector3 {
  return convertVector([origin[0] + offset[0], origin[1] + offset[1], origin[2] + offset[2]], unit);
}
