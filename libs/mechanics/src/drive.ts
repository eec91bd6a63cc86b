import type { Drive } from '@masswright/contracts';

/** α = ω/t: the constant angular acceleration that reaches a speed from rest in a time. */
export function computeAcceleration({ speedRadPerS, timeS }: Drive): number {
  return speedRadPerS / timeS;
}

/** τ = I α = I ω/t: the constant torque that brings a body from rest to a speed in a time, friction and load apart. */
export function computeTorque(inertiaKgM2: number, drive: Drive): number {
  return inertiaKgM2 * computeAcceleration(drive);
}

/** t = I ω/τ: how long a constant torque takes from rest to a speed. Undefined where it turns the other way or not at all. */
export function findRunUpTime(inertiaKgM2: number, speedRadPerS: number, torqueNm: number): number | undefined {
  const timeS = (inertiaKgM2 * speedRadPerS) / torqueNm;
  return Number.isFinite(timeS) && timeS >= 0 ? timeS : undefined;
}

/** ½ I ω²: the energy in a body that turns, and what a brake or a guard must be able to take. */
export function computeStoredEnergy(inertiaKgM2: number, speedRadPerS: number): number {
  return 0.5 * inertiaKgM2 * speedRadPerS * speedRadPerS;
}

/** J/N²: the inertia that a motor sees through a gear which divides its speed by N, without losses. */
export function computeReflectedInertia(loadKgM2: number, gearRatio: number): number {
  return loadKgM2 / (gearRatio * gearRatio);
}

/** τ/(N η): the torque at the motor for one at the load, through a gear of ratio N and efficiency η. */
export function computeMotorTorque(loadNm: number, gearRatio: number, efficiency = 1): number {
  return loadNm / (gearRatio * efficiency);
}

/** m (lead/2π)²: the inertia at a screw that moves a mass by its lead a turn. */
export function computeScrewInertia(massKg: number, leadM: number): number {
  const radius = leadM / (2 * Math.PI);
  return massKg * radius * radius;
}

/** √(Σ τ²t / Σ t): the steady torque that would warm a motor as much as a cycle of torques does. Undefined for a cycle of no duration. */
export function findRmsTorque(cycle: readonly { torqueNm: number; timeS: number }[]): number | undefined {
  const timeS = cycle.reduce((sum, step) => sum + step.timeS, 0);
  if (!(timeS > 0)) return undefined;
  return Math.sqrt(cycle.reduce((sum, step) => sum + step.torqueNm * step.torqueNm * step.timeS, 0) / timeS);
}
