import type { Vector3 } from '@masswright/contracts';
import type { RigidBody } from './axis-moment';
import { addTensors, shiftFromCentre, zeroTensor } from './tensor';
import { add, scale, subtract } from './vector';

/** Bodies of one frame taken together. Undefined where they weigh nothing in all. A cut-out is a body of negative mass and tensor. */
export function findCombinedBody(bodies: readonly RigidBody[]): RigidBody | undefined {
  const massKg = bodies.reduce((sum, body) => sum + body.massKg, 0);
  if (massKg === 0) return undefined;
  const moment = bodies.reduce<Vector3>((sum, body) => add(sum, scale(body.centreOfMassM, body.massKg)), [0, 0, 0]);
  const centreOfMassM = scale(moment, 1 / massKg);
  const inertiaAtCentreOfMassKgM2 = bodies.reduce(
    (sum, body) => addTensors(sum, shiftFromCentre(body.inertiaAtCentreOfMassKgM2, body.massKg, subtract(body.centreOfMassM, centreOfMassM))),
    zeroTensor,
  );
  return { massKg, centreOfMassM, inertiaAtCentreOfMassKgM2 };
}
