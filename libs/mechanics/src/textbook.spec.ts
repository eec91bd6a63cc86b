import type { Vector3 } from '@masswright/contracts';
import { describe, expect, it } from 'vitest';
import { computeAxisMoment, type Line, type RigidBody } from './axis-moment';
import { findCombinedBody } from './combine-bodies';
import { computeMotorTorque, computeReflectedInertia, computeScrewInertia, computeStoredEnergy, computeTorque, computeAcceleration, findRmsTorque, findRunUpTime } from './drive';
import { makeBall, makeDiagonal, makeDisc, makePoint, makeRod } from './testing/bodies';

const zAxis: Line = { pointM: [0, 0, 0], direction: [0, 0, 1] };
const rpm = (speed: number): number => (speed * 2 * Math.PI) / 60;

/** Moment of several bodies about an axis, by way of the body that they make together. */
function combine(bodies: readonly RigidBody[], line: Line = zAxis): number {
  const body = findCombinedBody(bodies);
  return body ? computeAxisMoment(body, line).inertiaKgM2 : NaN;
}

// OpenStax, University Physics Vol. 1, chapters 10 and 15: worked examples, digits as printed there.
describe('worked examples of a physics textbook', () => {
  const washers = (places: readonly number[]): number => combine(places.map((x) => makePoint(0.02, [x, 0, 0])));
  it('six washers of 20 g on a rod: 0.0035 kg·m², without the inner two 0.0034', () => {
    expect(washers([-0.25, -0.15, -0.05, 0.05, 0.15, 0.25])).toBeCloseTo(0.0035, 15);
    expect(washers([-0.25, -0.15, 0.15, 0.25])).toBeCloseTo(0.0034, 15);
  });
  it('four rotor blades of 50 kg and 4 m at 300 r/min: 1067 kg·m², 5.26e5 J', () => {
    const blades = [0, 1, 2, 3].map((k): RigidBody => {
      const along: Vector3 = k % 2 === 0 ? [1, 0, 0] : [0, 1, 0];
      const side = k < 2 ? 2 : -2;
      const inertia = (50 * 16) / 12;
      return { massKg: 50, centreOfMassM: [along[0] * side, along[1] * side, 0], inertiaAtCentreOfMassKgM2: k % 2 === 0 ? makeDiagonal(0, inertia, inertia) : makeDiagonal(inertia, 0, inertia) };
    });
    expect(combine(blades)).toBeCloseTo(3200 / 3, 10);
    expect(Math.round(combine(blades))).toBe(1067);
    expect(Math.abs(computeStoredEnergy(combine(blades), rpm(300)) - 5.26e5)).toBeLessThan(500);
  });
  it('a merry-go-round of 500 kg and R 2 m with a child of 25 kg at 1 m: 1025 kg·m²', () => {
    expect(combine([makeDisc(500, 2), makePoint(25, [1, 0, 0])])).toBeCloseTo(1025, 10);
  });
  it('a rod of 2 kg and 0.5 m with a ball of 1 kg and R 0.2 m at its end: 0.673 about the far end, 0.223 about the joint', () => {
    const bodies = [makeRod(2, 0.5, [0.25, 0, 0]), makeBall(1, 0.2, [0.7, 0, 0])];
    expect(combine(bodies)).toBeCloseTo(0.673, 3);
    expect(combine(bodies, { pointM: [0.5, 0, 0], direction: [0, 0, 1] })).toBeCloseTo(0.223, 3);
  });
  it('250 N at the rim of 50 kg and R 1.5 m: 56.25 kg·m², 375 N·m, 6.67 rad/s²; with 18 kg at 1.25 m 84.38 and 4.44', () => {
    const [bare, loaded] = [combine([makeDisc(50, 1.5)]), combine([makeDisc(50, 1.5), makePoint(18, [1.25, 0, 0])])];
    expect([bare, loaded]).toEqual([56.25, expect.closeTo(84.38, 2)]);
    // The time in which that torque reaches 1 rad/s is 1/α.
    expect(1 / (findRunUpTime(bare, 1, 250 * 1.5) ?? NaN)).toBeCloseTo(6.67, 2);
    expect(1 / (findRunUpTime(loaded, 1, 250 * 1.5) ?? NaN)).toBeCloseTo(4.44, 2);
  });
  it('30 kg·m² from rest to 20 rev/s in 10 s: 376.99 N·m (printed 376.8), stopped in 20 s: 188.5 N·m against the turning', () => {
    const speedRadPerS = 20 * 2 * Math.PI;
    expect(computeTorque(30, { speedRadPerS, timeS: 10 })).toBeCloseTo(376.99, 2);
    expect(computeTorque(30, { speedRadPerS: -speedRadPerS, timeS: 20 })).toBeCloseTo(-188.5, 1);
  });
  it('180 N at the rim of a disc of 75 kg and R 0.28 m: 50.4 N·m, 17.14 rad/s²; with a drag of 20 N at 1.5 cm 17.04', () => {
    const inertia = combine([makeDisc(75, 0.28)]);
    expect(180 * 0.28).toBeCloseTo(50.4, 10);
    expect(50.4 / inertia).toBeCloseTo(17.14, 2);
    expect(1 / (findRunUpTime(inertia, 1, 50.4 - 20 * 0.015) ?? NaN)).toBeCloseTo(17.04, 2);
  });
  it('100 kg·m² stopped from 500 r/min in 2 min: 43.6 N·m against the turning', () => {
    expect(computeTorque(100, { speedRadPerS: -rpm(500), timeS: 120 })).toBeCloseTo(-43.6, 1);
  });
  it('a disc of 4 kg and R 0.25 m with two masses of 1.5 kg at 0.15 m (computed by hand): 0.1925 kg·m²', () => {
    expect(combine([makeDisc(4, 0.25), makePoint(1.5, [0.15, 0, 0]), makePoint(1.5, [-0.15, 0, 0])])).toBeCloseTo(0.1925, 15);
  });
  it('block, hole and wedge (Engineering Statics: Open and Interactive, ch. 7): 26633 lb at (-3.22, 2.59, 3.37) ft', () => {
    const body = findCombinedBody([makePoint(216 * 125, [-3, 2, 4.5]), makePoint(-50.27 * 125, [-3, 2, 6]), makePoint(12 * 493, [-4, 4.67, 1])]);
    expect(Math.round(body?.massKg ?? NaN)).toBe(26632);
    expect(body?.centreOfMassM).toEqual([-3.22, 2.59, 3.37].map((element) => expect.closeTo(element, 2) as number));
  });
});

// Formulas from memory, numbers computed independently.
describe('drives', () => {
  it('a gear of 10 between 0.02 kg·m² and a motor of 5e-5 kg·m², to 300 r/min in 0.5 s', () => {
    const drive = { speedRadPerS: rpm(300), timeS: 0.5 };
    expect(computeAcceleration(drive)).toBeCloseTo(62.831853, 6);
    expect(computeTorque(0.02, drive)).toBeCloseTo(1.256637, 6);
    const reflected = computeReflectedInertia(0.02, 10);
    expect(reflected).toBeCloseTo(2e-4, 18);
    expect(reflected / 5e-5).toBeCloseTo(4, 14);
    const motor = computeTorque(reflected + 5e-5, { speedRadPerS: 10 * drive.speedRadPerS, timeS: 0.5 });
    expect(motor).toBeCloseTo(0.15708, 5);
    // The same from the load's side: its torque through the gear, and the motor's own.
    expect(computeMotorTorque(1.2566370614, 10) + computeTorque(5e-5, { speedRadPerS: 10 * drive.speedRadPerS, timeS: 0.5 })).toBeCloseTo(motor, 9);
    expect(computeMotorTorque(1.2566370614, 10, 0.8)).toBeCloseTo(0.15708, 5);
  });
  it('20 kg on a screw of 5 mm lead: 1.2665148e-5 kg·m²', () => {
    expect(computeScrewInertia(20, 0.005)).toBeCloseTo(1.2665148e-5, 12);
  });
  it('torques of 0.4, 0.1, -0.3, 0 N·m for 0.2, 0.6, 0.2, 1 s: RMS 0.167332', () => {
    const cycle = [[0.4, 0.2], [0.1, 0.6], [-0.3, 0.2], [0, 1]].map(([torqueNm = 0, timeS = 0]) => ({ torqueNm, timeS }));
    expect(findRmsTorque(cycle)).toBeCloseTo(0.167332, 6);
    expect(findRmsTorque([])).toBeUndefined();
  });
  it('a torque of zero, or against the speed, never gets there', () => {
    expect(findRunUpTime(1, 10, 0)).toBeUndefined();
    expect(findRunUpTime(1, 10, -2)).toBeUndefined();
    expect(findRunUpTime(1, -10, -2)).toBe(5);
  });
  it('torque times time is the change of angular momentum, torque times angle the stored energy', () => {
    const drive = { speedRadPerS: 40, timeS: 2 };
    const torque = computeTorque(0.3, drive);
    expect(torque * drive.timeS).toBeCloseTo(0.3 * 40, 12);
    expect(torque * (0.5 * computeAcceleration(drive) * drive.timeS ** 2)).toBeCloseTo(computeStoredEnergy(0.3, 40), 12);
    expect(findRunUpTime(0.3, 40, torque)).toBeCloseTo(2, 14);
  });
});
