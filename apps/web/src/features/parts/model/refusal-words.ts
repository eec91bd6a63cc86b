import type { Soundness } from '@masswright/contracts';
import { countOf } from '../../../lib/plural';

export interface Refusal {
  why: string;
  remedy: string;
}

const addAgain = 'export again, and add the file anew.';

/** Why a mesh gives no figures and what can be done about it; undefined where it gives them. */
export function findRefusal(soundness: Soundness): Refusal | undefined {
  if (soundness.defensible) return undefined;
  const { closed, boundaryEdges, oriented, findings } = soundness;
  if (closed === null) {
    return {
      why: 'The edges of the mesh do not cancel: it is open somewhere, or wound both ways. Either way there is no inside that could be told from the outside, so there is no volume, no mass and no inertia that could be defended.',
      remedy: `Have the modelling program check that the body is closed and its normals are consistent, ${addAgain}`,
    };
  }
  if (!closed) {
    return {
      why: `The mesh is open at ${boundaryEdges === null ? 'some edges' : countOf(boundaryEdges, 'edge')}. A surface with a gap encloses nothing, so it has no volume, no mass and no inertia that could be defended; a number could still be computed, and it would change with the place of the origin.`,
      remedy: 'Close the gap where the body is modelled, or export it again as one solid with a finer or watertight setting, and add the file anew.',
    };
  }
  if (!oriented) {
    return {
      why: 'The mesh is closed, but some of its facets are wound against their neighbours. What is inside for one is outside for the other, so parts of the volume would be taken away that should be added.',
      remedy: `Have the modelling program make the normals consistent, ${addAgain}`,
    };
  }
  if (findings.some(({ kind }) => kind === 'overlapping-shells')) {
    return {
      why: 'The mesh is closed, but some of its shells pass through each other, or lie within one another and both add. The space that they have in common would be counted twice.',
      remedy: `Unite the bodies where they are modelled, or keep each in a file of its own, ${addAgain}`,
    };
  }
  return {
    why: 'The surface is closed, but what it encloses can not be told from nothing: a sheet folded onto itself, for instance.',
    remedy: `Give the body a thickness where it is modelled, ${addAgain}`,
  };
}
