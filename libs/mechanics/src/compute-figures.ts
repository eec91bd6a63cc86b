import type { Measurement, Setting, StatementRecord, Vector3 } from '@masswright/contracts';
import type { LengthUnit } from '@masswright/units';
import type { RigidBody } from './axis-moment';
import { convertVector } from './body-vectors';
import { computePrincipalAxes, type PrincipalAxes } from './principal-axes';
import { weighMeasurement, type WeighedBody } from './weigh-measurement';

/** The figures of a measurement under a setting, in SI, without what is in doubt about them. */
export interface MeasuredFigures {
  weighed: WeighedBody;
  densityKgM3: number | null;
  weighing: StatementRecord['weighing'];
  boundingBoxM: { min: Vector3; max: Vector3 };
  volumeM3: number | null;
  centreOfMassM: Vector3 | null;
  body: RigidBody | null;
  principal: PrincipalAxes | null;
}

/** A record's figures alone: what a list needs of thousands of parts. */
export function computeFigures(measurement: Measurement, setting: Setting, lengthUnit: LengthUnit): MeasuredFigures {
  const weighed = weighMeasurement(measurement, setting, lengthUnit);
  const { min, max } = measurement.boundingBox;
  return {
    weighed,
    ...weighed.density,
    boundingBoxM: { min: convertVector(min, lengthUnit), max: convertVector(max, lengthUnit) },
    volumeM3: weighed.volumeM3,
    centreOfMassM: weighed.centreOfMassM,
    body: weighed.body,
    principal: weighed.body && computePrincipalAxes(weighed.body.inertiaAtCentreOfMassKgM2),
  };
}
