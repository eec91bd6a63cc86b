import { integrateBody, type BodyIntegrals } from '../integrate-body';
import { listedLoops, type Openings, type Vector3 } from '../measurement';
import type { WeldedMesh } from '../weld-corners';
import { balanceEdge } from './edges';
import type { EdgeTable } from './edge-table';
import { closeLoops, fanLoops } from './fan-loops';
import { findHairlines, hairlineVolume, measureLoop, toBoundaryLoop, type MeasuredLoop } from './hairlines';
import { traceLoops } from './loops';
import type { Notes } from './notes';

/** A mesh that is open by hairlines alone, closed for the sake of its figures. */
export interface ClosedMesh {
  mesh: WeldedMesh;
  /** Facets that were added: nine coordinates each, wound as the file's. */
  added: Float64Array;
  /** Integrals as the facets are stored. */
  body: BodyIntegrals;
  /** Facets of pieces that belong together though they share no edge. */
  joined: [number, number][];
}

export interface OpenMesh {
  openings: Openings;
  /** Whether the signed volume about the middle of the box is positive. */
  outward: boolean;
  /** Where the gaps leave the mesh defensible. */
  closed: ClosedMesh | undefined;
}

/** Examines a mesh that is not closed: its loops, and whether they are hairlines (`hairline-gaps`). */
export function examineOpenings(notes: Notes, table: EdgeTable, unusual: readonly number[], origin: Vector3, middle: Vector3, diagonal: number): OpenMesh {
  const { mesh } = notes;
  const loops = traceLoops(mesh, table, unusual).map((loop) => measureLoop(mesh, loop));
  const canBeClosed = unusual.every((edge) => Math.abs(balanceEdge(mesh, table, edge).surplus) < 2);
  const hairlines = canBeClosed ? findHairlines(mesh, loops, diagonal) : undefined;
  const added = fanLoops(mesh, loops);
  const aboutMiddle = integrateBody(mesh, middle, diagonal);
  const body = integrateBody(mesh, hairlines === undefined ? middle : origin, diagonal, { added });
  if (hairlines !== undefined) noteHairlines(notes, loops);
  const order = loops.map((_, k) => k).sort((one, two) => (loops[two]?.length ?? 0) - (loops[one]?.length ?? 0) || one - two);
  const openings: Openings = {
    loops: order.slice(0, listedLoops).flatMap((k) => {
      const loop = loops[k];
      return loop === undefined ? [] : [toBoundaryLoop(mesh, loop, hairlines?.widths[k])];
    }),
    loopCount: loops.length,
    volumes: { aboutMiddle: aboutMiddle.volume.content, fanned: body.volume.content },
    lostVolume: hairlines?.lostVolume ?? null,
  };
  const outward = aboutMiddle.volumeSign > 0;
  if (hairlines === undefined || !(hairlines.lostVolume < hairlineVolume * Math.abs(body.volume.content))) return { openings, outward, closed: undefined };
  const joined = hairlines.seams.map(([one, two]): [number, number] => [loops[one]?.loop.facets[0] ?? 0, loops[two]?.loop.facets[0] ?? 0]);
  return { openings, outward, closed: { mesh: closeLoops(mesh, loops), added, body, joined } };
}

function noteHairlines(notes: Notes, loops: readonly MeasuredLoop[]): void {
  for (const { loop } of loops) {
    notes.add('hairline-gaps');
    for (const facet of loop.facets) notes.mark('hairline-gaps', facet);
    for (const [k, vertex] of loop.vertices.entries()) notes.addEdge('hairline-gaps', vertex, loop.vertices[(k + 1) % loop.vertices.length] ?? 0);
  }
}
