import type { Vector3 } from '@masswright/contracts';
import type { RigidBody } from './axis-moment';
import { rotateTensor, type Rotation, type Tensor } from './tensor';
import { add, cross, dot, findDirection, scale, subtract } from './vector';

/** A right-handed frame: where its origin is and along which unit vectors its axes run, in the mesh frame. */
export interface Frame {
  originM: Vector3;
  axes: Rotation;
}

export const meshFrame: Frame = { originM: [0, 0, 0], axes: [[1, 0, 0], [0, 1, 0], [0, 0, 1]] };

/** Directions nearer than this to parallel (the sine of the angle) do not span a plane. */
const leastSine = 1e-6;

/**
 * The frame with its x axis along `x` and its y axis in the plane of `x` and `towardsY`, on the side of the latter.
 * Undefined where the directions are zero or parallel.
 */
export function findFrame(originM: Vector3, x: Vector3, towardsY: Vector3): Frame | undefined {
  const axisX = findDirection(x);
  const side = findDirection(towardsY);
  if (axisX === undefined || side === undefined) return undefined;
  const normal = cross(axisX, side);
  if (dot(normal, normal) < leastSine * leastSine) return undefined;
  // Anew from y, so that the axes are at right angles to the last digit even where the given directions are all but parallel.
  const axisY = findDirection(cross(normal, axisX)) ?? normal;
  return { originM, axes: [axisX, axisY, cross(axisX, axisY)] };
}

/** A direction of the mesh frame as the frame sees it. */
export function expressDirection(direction: Vector3, { axes }: Frame): Vector3 {
  return [dot(axes[0], direction), dot(axes[1], direction), dot(axes[2], direction)];
}

/** A point of the mesh frame as the frame sees it. */
export function expressPoint(pointM: Vector3, frame: Frame): Vector3 {
  return expressDirection(subtract(pointM, frame.originM), frame);
}

/** A direction of the frame, back in the mesh frame. */
export function restoreDirection([x, y, z]: Vector3, { axes }: Frame): Vector3 {
  return add(add(scale(axes[0], x), scale(axes[1], y)), scale(axes[2], z));
}

/** A point of the frame, back in the mesh frame. */
export function restorePoint(pointM: Vector3, frame: Frame): Vector3 {
  return add(restoreDirection(pointM, frame), frame.originM);
}

/** A tensor about its own point, along the axes of the frame instead of the mesh's. */
export function expressTensor(tensor: Tensor, { axes }: Frame): Tensor {
  return rotateTensor(tensor, axes);
}

/** A tensor along the frame's axes, back along those of the mesh frame. */
export function restoreTensor(tensor: Tensor, { axes: [x, y, z] }: Frame): Tensor {
  return rotateTensor(tensor, [[x[0], y[0], z[0]], [x[1], y[1], z[1]], [x[2], y[2], z[2]]]);
}

/** A body as the frame sees it: its centre of mass, and its central tensor along the frame's axes. */
export function expressBody(body: RigidBody, frame: Frame): RigidBody {
  return {
    massKg: body.massKg,
    centreOfMassM: expressPoint(body.centreOfMassM, frame),
    inertiaAtCentreOfMassKgM2: expressTensor(body.inertiaAtCentreOfMassKgM2, frame),
  };
}
