import type { FigureChanges, Vector3 } from '@masswright/contracts';
import type { Line, RigidBody } from '../axis-moment';
import type { PrincipalAxes } from '../principal-axes';
import { addTensors, computeForm, computeTensorFromSecondMoments, scaleTensor, type Tensor } from '../tensor';
import { cross, dot, scale, subtract } from '../vector';
import type { BodyChange } from './body-change';

/** What figures follow from: a body, and what was computed of it. */
export interface FigureBasis {
  body: RigidBody;
  /** Integrals over the part of the body that has the density that `BodyChange.densityKgM3` changes: content, ∫x… and the tensor at unit density, about the centre of mass. */
  uniform: { content: number; first: Vector3; tensor: Tensor };
  /** By which a change of the integrals changes the mass. Of a body of several densities: their mean. */
  densityKgM3: number;
  principal: PrincipalAxes;
  line: Line | null;
  /** Figures that hang on the density are given. */
  weighs: boolean;
}

/** A change of mass, centre of mass and central tensor. */
export interface RigidChange {
  massKg: number;
  centreOfMassM: Vector3;
  tensor: Tensor;
}

/**
 * First-order change of mass, centre and tensor. The integrals of the change are about the centre of mass, where the first moments vanish: its own shift then changes the central
 * tensor in second order only.
 */
export function changeBody({ content, first, second, densityKgM3 }: BodyChange, { body, uniform, densityKgM3: density }: FigureBasis): RigidChange {
  const moment = (k: 0 | 1 | 2): number => density * first[k] + densityKgM3 * uniform.first[k];
  return {
    massKg: density * content + densityKgM3 * uniform.content,
    centreOfMassM: [moment(0) / body.massKg, moment(1) / body.massKg, moment(2) / body.massKg],
    tensor: addTensors(scaleTensor(computeTensorFromSecondMoments(second), density), scaleTensor(uniform.tensor, densityKgM3)),
  };
}

/** First-order change of every figure of the record: principal moments by uᵀ δI u, radii √(I/m) by half of themselves times δI/I - δm/m. */
export function changeFigures(change: BodyChange, basis: FigureBasis): FigureChanges {
  const { body, principal, line, weighs } = basis;
  const { massKg, centreOfMassM, tensor } = changeBody(change, basis);
  const moments = ([0, 1, 2] as const).map((k) => computeForm(tensor, principal.axes[k], principal.axes[k])) as Vector3;
  const changeRadius = (moment: number, own: number): number => (own > 0 ? 0.5 * Math.sqrt(own / body.massKg) * (moment / own - massKg / body.massKg) : 0);
  const about = line && changeAboutLine({ massKg, centreOfMassM, tensor }, body, line);
  return {
    volumeM3: change.content,
    areaM2: change.area,
    massKg: weighs ? massKg : null,
    centreOfMassM,
    inertiaAtCentreOfMassKgM2: weighs ? tensor : null,
    principalMomentsKgM2: weighs ? moments : null,
    radiiOfGyrationM: weighs ? [changeRadius(moments[0], principal.moments[0]), changeRadius(moments[1], principal.moments[1]), changeRadius(moments[2], principal.moments[2])] : null,
    aboutAxis: weighs && about ? { inertiaKgM2: about.moment, radiusOfGyrationM: changeRadius(about.moment, about.own) } : null,
  };
}

/** Of uᵀ I u + m |(c - p) × u|². A line through the centre of mass goes with it. */
function changeAboutLine({ massKg, centreOfMassM, tensor }: RigidChange, body: RigidBody, { pointM, direction }: Line): { moment: number; own: number } {
  const arm = subtract(body.centreOfMassM, pointM);
  const across = cross(arm, direction);
  // Of the arm the part at right angles to the line.
  const normal = subtract(arm, scale(direction, dot(arm, direction)));
  return {
    moment: computeForm(tensor, direction, direction) + massKg * dot(across, across) + 2 * body.massKg * dot(normal, centreOfMassM),
    own: computeForm(body.inertiaAtCentreOfMassKgM2, direction, direction) + body.massKg * dot(across, across),
  };
}
