import type { Affine } from '../affine';
import type { DeclaredUnit } from '../measurement';

/** An object of another one, or of the plate that is built, and where it is placed. */
export interface Reference {
  objectId: number;
  /** The part that the object is in; undefined where it is this one. */
  part: string | undefined;
  affine: Affine;
  line: number;
}

/** An object: a mesh, or others put together. */
export interface ModelObject {
  id: number;
  /** What it is for: only "model" is body. */
  type: string;
  line: number;
  /** Three coordinates a vertex; may be longer than what is used. */
  vertices: Float64Array<ArrayBuffer>;
  vertexCount: number;
  /** Three vertices a triangle. */
  triangles: Uint32Array<ArrayBuffer>;
  triangleCount: number;
  components: Reference[];
  /** Groups of properties that its triangles use, and places in them: `7/0`. */
  materials: Set<string>;
}

/** One model of a 3MF file. */
export interface ModelPart {
  name: string;
  unit: DeclaredUnit;
  objects: Map<number, ModelObject>;
  items: Reference[];
  /** Names of materials by group and place, as the objects refer to them. */
  materialNames: Map<string, string>;
}
