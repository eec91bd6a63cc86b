/** The parts of the package that the tests call; it has no types of its own. */
declare module '@jscadui/3mf-export' {
  interface Mesh3mf {
    id: string;
    vertices: Float32Array | Float64Array;
    indices: Uint32Array;
    name?: string;
  }
  interface Child3mf {
    objectID: string;
    /** Column by column. */
    transform?: readonly number[];
  }
  export function to3dmodel(model: {
    meshes: Mesh3mf[];
    components?: { id: string; name: string; children: Child3mf[] }[];
    items: Child3mf[];
    precision?: number;
    header?: { unit?: string };
  }): string;
}
