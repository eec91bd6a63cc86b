import type { WeldedMesh } from '../weld-corners';
import { balanceEdge } from './edges';
import { facetOf, fromVertex, runsForward, toVertex, type EdgeTable } from './edge-table';

/** A closed run of boundary edges. Step k goes from vertices[k] to vertices[k + 1], and after the last back to the first. */
export interface Loop {
  vertices: number[];
  /** A facet at each step. */
  facets: number[];
  /** All steps go the way that a facet would take to close the gap: against the facets that they belong to. */
  followable: boolean;
}

/** A boundary edge in the way in which a facet on the other side of it would run. */
interface Step {
  from: number;
  to: number;
  facet: number;
}

/**
 * Takes the boundary edges apart into loops that pass no vertex twice. As many boundary edges end at a vertex as there are facets' sides, an even number, so that
 * nothing is left over. Where the facets at it are wound alike, the loops follow one direction.
 */
export function traceLoops(mesh: WeldedMesh, table: EdgeTable, unusual: readonly number[]): Loop[] {
  const steps = listSteps(mesh, table, unusual);
  const outward = linkSteps(steps, ({ from }) => from);
  const inward = linkSteps(steps, ({ to }) => to);
  const used = new Uint8Array(steps.length);
  const placeOf = new Map<number, number>();
  const loops: Loop[] = [];

  const takeStep = (vertex: number): { step: number; forward: boolean } | undefined => {
    const out = takeUnused(outward, vertex, used);
    if (out >= 0) return { step: out, forward: true };
    const back = takeUnused(inward, vertex, used);
    return back < 0 ? undefined : { step: back, forward: false };
  };

  for (let start = 0; start < steps.length; start++) {
    if (used[start] === 1) continue;
    const path: { vertex: number; facet: number; forward: boolean }[] = [];
    let vertex = steps[start]?.from ?? 0;
    for (let taken = takeStep(vertex); taken !== undefined; taken = takeStep(vertex)) {
      const step = steps[taken.step];
      if (step === undefined) break;
      used[taken.step] = 1;
      placeOf.set(vertex, path.length);
      path.push({ vertex, facet: step.facet, forward: taken.forward });
      vertex = taken.forward ? step.to : step.from;
      const place = placeOf.get(vertex);
      if (place === undefined) continue;
      // The path has come back to a vertex: what lies between is a loop.
      const loop = path.splice(place);
      for (const { vertex: passed } of loop) placeOf.delete(passed);
      loops.push(toLoop(loop));
    }
  }
  return loops;
}

function toLoop(path: readonly { vertex: number; facet: number; forward: boolean }[]): Loop {
  return { vertices: path.map(({ vertex }) => vertex), facets: path.map(({ facet }) => facet), followable: path.every(({ forward }) => forward) };
}

function listSteps(mesh: WeldedMesh, table: EdgeTable, unusual: readonly number[]): Step[] {
  const steps: Step[] = [];
  for (const edge of unusual) {
    const { facets, surplus } = balanceEdge(mesh, table, edge);
    if (facets % 2 === 0) continue;
    // One of the facets that are too many in their direction.
    for (let k = table.starts[edge] ?? 0; k < (table.starts[edge + 1] ?? 0); k++) {
      const halfEdge = table.halfEdges[k] ?? 0;
      if (runsForward(mesh, halfEdge) !== surplus > 0) continue;
      steps.push({ from: toVertex(mesh, halfEdge), to: fromVertex(mesh, halfEdge), facet: facetOf(halfEdge) });
      break;
    }
  }
  return steps;
}

/** For each vertex the steps that have it as one end, in their order. */
interface Links {
  first: Map<number, number>;
  next: Int32Array;
}

function linkSteps(steps: readonly Step[], endOf: (step: Step) => number): Links {
  const first = new Map<number, number>();
  const next = new Int32Array(steps.length).fill(-1);
  for (let k = steps.length - 1; k >= 0; k--) {
    const step = steps[k];
    if (step === undefined) continue;
    next[k] = first.get(endOf(step)) ?? -1;
    first.set(endOf(step), k);
  }
  return { first, next };
}

/** The first step at a vertex that isn't used, or -1; those before it are never looked at again. */
function takeUnused({ first, next }: Links, vertex: number, used: Uint8Array): number {
  let step = first.get(vertex) ?? -1;
  while (step >= 0 && used[step] === 1) step = next[step] ?? -1;
  first.set(vertex, step);
  return step;
}
