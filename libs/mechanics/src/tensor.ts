import type { Symmetric3, Vector3 } from '@masswright/contracts';

/**
 * An inertia tensor: the six elements of the symmetric matrix, off-diagonals -∫xy dm, in kg·m², about the point and along the axes
 * that the caller states. A product of inertia P_xy = +∫xy dm is the negative of an off-diagonal.
 */
export type Tensor = Symmetric3;

export const zeroTensor: Tensor = { xx: 0, yy: 0, zz: 0, xy: 0, yz: 0, zx: 0 };

/** Rows of a rotation: the axes of the new frame, as unit vectors in the old one. */
export type Rotation = [Vector3, Vector3, Vector3];

function combine(one: Tensor, two: Tensor, by: (a: number, b: number) => number): Tensor {
  return { xx: by(one.xx, two.xx), yy: by(one.yy, two.yy), zz: by(one.zz, two.zz), xy: by(one.xy, two.xy), yz: by(one.yz, two.yz), zx: by(one.zx, two.zx) };
}

/** Sum of two tensors about the same point along the same axes: the tensor of both bodies together. */
export function addTensors(one: Tensor, two: Tensor): Tensor {
  return combine(one, two, (a, b) => a + b);
}

export function subtractTensors(one: Tensor, two: Tensor): Tensor {
  return combine(one, two, (a, b) => a - b);
}

export function scaleTensor(tensor: Tensor, factor: number): Tensor {
  return combine(tensor, tensor, (a) => a * factor);
}

/** The matrix times a vector: angular momentum for an angular velocity. */
export function multiplyTensor({ xx, yy, zz, xy, yz, zx }: Tensor, [x, y, z]: Vector3): Vector3 {
  return [xx * x + xy * y + zx * z, xy * x + yy * y + yz * z, zx * x + yz * y + zz * z];
}

/** uᵀ I v. With u = v a unit vector: the moment of inertia about the axis along it through the tensor's point. */
export function computeForm(tensor: Tensor, u: Vector3, v: Vector3): number {
  const [x, y, z] = multiplyTensor(tensor, v);
  return u[0] * x + u[1] * y + u[2] * z;
}

/** The tensor about the same point along the axes of another frame: R I Rᵀ. */
export function rotateTensor(tensor: Tensor, [x, y, z]: Rotation): Tensor {
  return {
    xx: computeForm(tensor, x, x),
    yy: computeForm(tensor, y, y),
    zz: computeForm(tensor, z, z),
    xy: computeForm(tensor, x, y),
    yz: computeForm(tensor, y, z),
    zx: computeForm(tensor, z, x),
  };
}

/** m (d² E - d dᵀ): the tensor of a point mass at d about the origin, and the term of the parallel-axis theorem (Steiner). */
export function computePointTensor(massKg: number, [x, y, z]: Vector3): Tensor {
  return {
    xx: massKg * (y * y + z * z),
    yy: massKg * (z * z + x * x),
    zz: massKg * (x * x + y * y),
    xy: -massKg * x * y,
    yz: -massKg * y * z,
    zx: -massKg * z * x,
  };
}

/** From the centre of mass to a point that lies `offsetM` from it (either way round: the sign does not matter). */
export function shiftFromCentre(central: Tensor, massKg: number, offsetM: Vector3): Tensor {
  return addTensors(central, computePointTensor(massKg, offsetM));
}

/** From a point that lies `offsetM` from the centre of mass back to the centre of mass. */
export function shiftToCentre(aboutPoint: Tensor, massKg: number, offsetM: Vector3): Tensor {
  return subtractTensors(aboutPoint, computePointTensor(massKg, offsetM));
}

/** Inertia tensor from second moments ∫x² dm, …, ∫xy dm (plus signs) about the same point. */
export function computeTensorFromSecondMoments(second: Symmetric3): Tensor {
  return {
    xx: second.yy + second.zz,
    yy: second.zz + second.xx,
    zz: second.xx + second.yy,
    // 0 - x and not -x: a zero stays without a sign.
    xy: 0 - second.xy,
    yz: 0 - second.yz,
    zx: 0 - second.zx,
  };
}
