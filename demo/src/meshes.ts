import { writeAsciiStl, writeBinaryStl } from '@masswright/geometry';
import type { LengthUnit } from '@masswright/units';
import createModule, { type CrossSection, type Manifold, type ManifoldToplevel } from 'manifold-3d';

export interface DemoMesh {
  fileName: string;
  partName: string;
  bytes: Uint8Array<ArrayBuffer>;
  setting: { lengthUnit: LengthUnit; material: { id: string } };
}

/** Of the library that every installation has. */
const aluminium = 'al-6061-t6';
const steel = 'steel-mild';
const acetal = 'pom';

/** Nine coordinates a facet, in the order of the mesh. */
function cornersOf(solid: Manifold): number[] {
  const { triVerts, vertProperties, numProp } = solid.getMesh();
  const corners: number[] = [];
  for (const vertex of triVerts) for (let axis = 0; axis < 3; axis++) corners.push(vertProperties[vertex * numProp + axis] ?? 0);
  return corners;
}

const turnedInsideOut = (corners: readonly number[]): number[] =>
  corners.flatMap((_, at) => (at % 9 === 0 ? [...corners.slice(at, at + 3), ...corners.slice(at + 6, at + 9), ...corners.slice(at + 3, at + 6)] : []));

/** The parts of a reel that winds the tether of a weather kite, in millimetres. */
function modelReel({ Manifold, CrossSection }: ManifoldToplevel) {
  const cylinder = (height: number, radius: number, segments = 96) => Manifold.cylinder(height, radius, radius, segments);
  const ring = (count: number, radius: number, make: (angle: number) => Manifold) =>
    Array.from({ length: count }, (_, index) => {
      const angle = (360 * index) / count;
      return make(angle).translate([radius * Math.cos((angle * Math.PI) / 180), radius * Math.sin((angle * Math.PI) / 180), 0]);
    });
  const slot = (length: number, width: number): CrossSection =>
    CrossSection.hull([CrossSection.circle(width / 2, 48), CrossSection.circle(width / 2, 48).translate([length, 0])]);

  const flange = Manifold.union([cylinder(6, 52), cylinder(26, 22)])
    .subtract(cylinder(40, 9).translate([0, 0, -5]))
    .subtract(Manifold.union(ring(5, 38, () => cylinder(20, 6, 48).translate([0, 0, -5]))))
    .add(Manifold.cube([16, 10, 8], true).translate([0, -44, 8]));
  const drum = cylinder(80, 34).subtract(cylinder(90, 30).translate([0, 0, -5])).add(Manifold.union(ring(6, 20, (angle) => Manifold.cube([22, 3, 80], true).rotate([0, 0, angle]).translate([0, 0, 40]))))
    .subtract(cylinder(90, 9).translate([0, 0, -5]))
    .add(cylinder(80, 12).subtract(cylinder(90, 9).translate([0, 0, -5])));
  const spindle = Manifold.union([cylinder(140, 8.9, 72), cylinder(6, 14, 72).translate([0, 0, 20]), cylinder(18, 6, 72).translate([0, 0, -18])]);
  const crank = Manifold.union([slot(110, 22).extrude(9), cylinder(22, 15, 72), cylinder(30, 8, 72).translate([110, 0, 0])]).subtract(cylinder(60, 6.1, 72).translate([0, 0, -10]));
  const sidePlate = CrossSection.square([150, 120], true)
    .offset(8, 'Round', 2, 32)
    .subtract(CrossSection.circle(24, 96))
    .subtract(CrossSection.compose([slot(60, 16).translate([-30, 42]), slot(60, 16).translate([-30, -42])]))
    .extrude(5)
    .add(cylinder(12, 32).subtract(cylinder(30, 24).translate([0, 0, -5])));
  const ratchet = CrossSection.ofPolygons([Array.from({ length: 48 }, (_, index): [number, number] => {
    const radius = index % 2 === 0 ? 30 : 25;
    const angle = (Math.PI * (index + (index % 2 === 0 ? 0.7 : 0))) / 24;
    return [radius * Math.cos(angle), radius * Math.sin(angle)];
  })])
    .extrude(7)
    .subtract(cylinder(20, 9).translate([0, 0, -5]));
  const seat = cylinder(14, 20).subtract(cylinder(20, 13).translate([0, 0, 4]));
  return { flange, drum, spindle, crank, sidePlate, ratchet, seat };
}

/** Meshes of an invented maker of tethered weather kites: sound ones, one inside out, one that leaks, one that was cut off. */
export async function makeDemoMeshes(): Promise<DemoMesh[]> {
  const module = await createModule();
  module.setup();
  const reel = modelReel(module);
  const mm = (material: string) => ({ lengthUnit: 'mm' as const, material: { id: material } });
  const seat = cornersOf(reel.seat);
  const spindle = writeBinaryStl(cornersOf(reel.spindle));
  return [
    { fileName: 'drum-flange.stl', partName: 'Drum flange', bytes: writeBinaryStl(cornersOf(reel.flange)), setting: mm(aluminium) },
    { fileName: 'drum.stl', partName: 'Drum', bytes: writeBinaryStl(cornersOf(reel.drum)), setting: mm(acetal) },
    { fileName: 'spindle.stl', partName: 'Spindle', bytes: spindle, setting: mm(steel) },
    { fileName: 'crank-arm.stl', partName: 'Crank arm', bytes: writeAsciiStl(cornersOf(reel.crank), 'crank-arm'), setting: mm(aluminium) },
    { fileName: 'side-plate.stl', partName: 'Side plate', bytes: writeBinaryStl(cornersOf(reel.sidePlate)), setting: mm(aluminium) },
    { fileName: 'ratchet-wheel.stl', partName: 'Ratchet wheel', bytes: writeBinaryStl(turnedInsideOut(cornersOf(reel.ratchet))), setting: mm(steel) },
    { fileName: 'bearing-seat.stl', partName: 'Bearing seat', bytes: writeBinaryStl(seat.slice(0, seat.length - 9 * 6)), setting: mm(acetal) },
    { fileName: 'spindle-old.stl', partName: 'Spindle, old export', bytes: spindle.slice(0, Math.floor(spindle.length * 0.6)), setting: mm(steel) },
  ];
}
