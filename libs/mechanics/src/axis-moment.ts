import type { Axis, Vector3 } from '@masswright/contracts';
import { computeForm, type Tensor } from './tensor';
import { cross, dot, findDirection, subtract } from './vector';

/** A body as far as turning is concerned. The tensor is about the centre of mass. */
export interface RigidBody {
  massKg: number;
  centreOfMassM: Vector3;
  inertiaAtCentreOfMassKgM2: Tensor;
}

/** A line: a point of it, and a unit vector along it. */
export interface Line {
  pointM: Vector3;
  direction: Vector3;
}

export interface AxisMoment {
  /** About the axis itself: the two following together. */
  inertiaKgM2: number;
  /** uᵀ I_c u: about the parallel axis through the centre of mass. */
  throughCentreKgM2: number;
  /** m d²: what the parallel-axis theorem adds. */
  parallelAxisTermKgM2: number;
  /** d, from the centre of mass to the axis. */
  distanceM: number;
  /** √(I/m). */
  radiusOfGyrationM: number;
}

/** Moment of inertia about a line: I = uᵀ I_c u + m |(c - p) × u|². */
export function computeAxisMoment(body: RigidBody, { pointM, direction }: Line): AxisMoment {
  const arm = cross(subtract(body.centreOfMassM, pointM), direction);
  const distanceSquared = dot(arm, arm);
  const throughCentreKgM2 = computeForm(body.inertiaAtCentreOfMassKgM2, direction, direction);
  const parallelAxisTermKgM2 = body.massKg * distanceSquared;
  const inertiaKgM2 = throughCentreKgM2 + parallelAxisTermKgM2;
  return {
    inertiaKgM2,
    throughCentreKgM2,
    parallelAxisTermKgM2,
    distanceM: Math.sqrt(distanceSquared),
    radiusOfGyrationM: computeRadiusOfGyration(inertiaKgM2, body.massKg),
  };
}

/** √(I/m); 0 where rounding has left the moment of a line-like body below zero. */
export function computeRadiusOfGyration(inertiaKgM2: number, massKg: number): number {
  return Math.sqrt(Math.max(0, inertiaKgM2 / massKg));
}

const along: Record<'x' | 'y' | 'z', Vector3> = { x: [1, 0, 0], y: [0, 1, 0], z: [0, 0, 1] };

/**
 * The line that a chosen axis is, in the mesh frame. Undefined where it cannot be told: an axis through the centre of mass of a body whose
 * centre is not known, a principal axis of one whose tensor is not known, a direction of length zero.
 */
export function resolveAxis(axis: Axis, statement: { centreOfMassM: Vector3 | null; principalAxes: [Vector3, Vector3, Vector3] | null }): Line | undefined {
  const { centreOfMassM, principalAxes } = statement;
  switch (axis.kind) {
    case 'typed': {
      const direction = findDirection(axis.direction);
      return direction && { pointM: axis.pointM, direction };
    }
    case 'mesh':
      return centreOfMassM ? { pointM: centreOfMassM, direction: along[axis.along] } : undefined;
    case 'principal': {
      const direction = principalAxes?.[axis.number - 1];
      return centreOfMassM && direction ? { pointM: centreOfMassM, direction } : undefined;
    }
  }
}
