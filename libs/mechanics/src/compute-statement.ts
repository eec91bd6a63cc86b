import type { Measurement, Setting, StatementRecord } from '@masswright/contracts';
import { convertToMetres } from '@masswright/units';
import { computeAxisMoment, computeRadiusOfGyration, resolveAxis, type Line, type RigidBody } from './axis-moment';
import { mapVector } from './body-vectors';
import { computeFigures } from './compute-figures';
import { classifyAxes } from './principal-axes';
import { compareMoments } from './uncertainty/compare-moments';
import { computeBudget, stateBudget } from './uncertainty/compute-uncertainty';

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
  const { weighed, densityKgM3, weighing, boundingBoxM, volumeM3, centreOfMassM, body, principal } = computeFigures(measurement, setting, lengthUnit);
  const budget = computeBudget(measurement, setting, lengthUnit, weighed);
  const doubt = budget && stateBudget(budget);
  const line = resolveAxis(setting.axis, { centreOfMassM, principalAxes: principal?.axes ?? null });
  return {
    schema: 'masswright.statement/1',
    file,
    sha256,
    format: measurement.format,
    lengthUnit,
    facets: measurement.facets,
    measuringVersion: measurement.measuringVersion,
    soundness: measurement.soundness,
    material: setting.material?.name ?? null,
    densityKgM3,
    weighing,
    volumeM3,
    areaM2: convertToMetres(measurement.surface.content, lengthUnit, 2),
    massKg: body?.massKg ?? null,
    boundingBoxM,
    frame: 'mesh',
    centreOfMassM,
    inertiaAtCentreOfMassKgM2: body && { ...body.inertiaAtCentreOfMassKgM2, offDiagonals: '-∫xy dm' },
    principalMomentsKgM2: principal?.moments ?? null,
    principalAxes: principal?.axes ?? null,
    axes: principal && budget && classifyAxes(principal.moments, compareMoments(budget)),
    radiiOfGyrationM: body && principal && mapVector(principal.moments, (moment) => computeRadiusOfGyration(moment, body.massKg)),
    aboutAxis: body && line ? computeAboutAxis(body, line) : null,
    correction: doubt?.correction ?? null,
    uncertainty: doubt?.uncertainty ?? null,
  };
}

function computeAboutAxis(body: RigidBody, line: Line): NonNullable<StatementRecord['aboutAxis']> {
  const { inertiaKgM2, radiusOfGyrationM } = computeAxisMoment(body, line);
  return { ...line, inertiaKgM2, radiusOfGyrationM };
}
