import { cutPolygon } from './cut-polygon';
import type { FacetSink } from './facet-batch';
import { createFacetWriter } from './facet-writer';
import { formatNames, noRemarks, type FileRemarks, type Remark } from './format-reader';
import { growArray } from './grow-array';
import type { ReadingLimits } from './limits';
import { findingFacets, type MeshFormat } from './measurement';
import { MeshError, spellCount, type MeshPlace } from './mesh-error';
import { findPolygonShape } from './polygon-shape';
import { measurePolygonDoubt } from './polygon-doubt';
import { noCorner } from './text-lane/lane-memory';

/** A mesh of vertices, and of polygons that name them. Vertices keep binary64. */
export interface PolygonMesh {
  /** Throws a MeshError where the vertices become too many. */
  addVertex(x: number, y: number, z: number): void;
  /** Adds vertices of three coordinates each, as many as there is room for. */
  addVertices(coordinates: Float64Array, count: number): void;
  beginPolygon(): void;
  /** Adds a corner, the number (from 0) of a vertex that is there. Throws a MeshError where the corners become too many. */
  addCorner(vertex: number): void;
  /** Hands on the triangles of a polygon of three corners or more. Throws a MeshError where the facets become too many. */
  endPolygon(): void;
  /**
   * Adds polygons, as many as there is room for: four numbers of vertices that are there (from 0) each, of which the fourth is `noCorner` where it is a
   * triangle.
   */
  addPolygons(polygons: Uint32Array, count: number): void;
  /** Hands on the last facets. */
  finish(): FileRemarks;
  readonly vertexCount: number;
  /** How many vertices more it takes. */
  readonly vertexRoom: number;
  /** Corners of the polygon that was begun. */
  readonly corners: number;
  readonly facets: number;
  /** How many facets more it takes. */
  readonly facetRoom: number;
}

/**
 * Cuts polygons into triangles in the order of the file: each as a fan from its first corner or, where that fan would fold back on itself, by its ears.
 *
 * @param sink takes the facets
 * @param getPlace where the file is being read, for a refusal
 */
export function createPolygonMesh(format: MeshFormat, limits: ReadingLimits, sink: FacetSink, getPlace: () => MeshPlace): PolygonMesh {
  const writer = createFacetWriter(format, limits.maximumFacets, sink, getPlace);
  const remarks = noRemarks();
  let vertices = new Float64Array(3 * 1024);
  let vertexCount = 0;
  let polygon = new Uint32Array(64);
  let corners = 0;

  function addVertex(x: number, y: number, z: number): void {
    if (vertexCount === limits.maximumVertices) {
      throw new MeshError('too-many-vertices', `The mesh (${formatNames[format]}) has more than ${spellCount(vertexCount)} vertices, the most that can be examined here. Reduce it or split it into parts.`, getPlace());
    }
    const at = 3 * vertexCount;
    if (vertices.length < at + 3) vertices = growArray(vertices, at + 3, 3 * limits.maximumVertices);
    vertices[at] = x;
    vertices[at + 1] = y;
    vertices[at + 2] = z;
    vertexCount += 1;
  }

  function addVertices(coordinates: Float64Array, count: number): void {
    const at = 3 * vertexCount;
    if (vertices.length < at + 3 * count) vertices = growArray(vertices, at + 3 * count, 3 * limits.maximumVertices);
    vertices.set(coordinates.subarray(0, 3 * count), at);
    vertexCount += count;
  }

  function addCorner(vertex: number): void {
    if (corners === limits.maximumPolygonCorners) {
      const at = getPlace();
      const where = at.line === undefined ? 'A polygon' : `The polygon in line ${spellCount(at.line)}`;
      throw new MeshError('polygon-too-large', `${where} of this ${formatNames[format]} mesh has more than ${spellCount(corners)} corners, the most that are read of one. Triangulate the mesh and export it again.`, at);
    }
    if (corners === polygon.length) polygon = growArray(polygon, corners + 1, limits.maximumPolygonCorners);
    polygon[corners] = vertex;
    corners += 1;
  }

  function endPolygon(): void {
    writer.checkRoom(corners - 2);
    const triangles = corners > 3 ? cutFolded() : undefined;
    for (let k = 2; k < corners; k++) {
      if (triangles === undefined) writer.addTriangle(vertices, polygon[0] ?? 0, polygon[k - 1] ?? 0, polygon[k] ?? 0);
      else writer.addTriangle(vertices, triangles[3 * k - 6] ?? 0, triangles[3 * k - 5] ?? 0, triangles[3 * k - 4] ?? 0);
    }
  }

  function addPolygons(polygons: Uint32Array, count: number): void {
    for (let at = 0; at < 4 * count; at += 4) {
      if (polygons[at + 3] === noCorner) {
        writer.addTriangle(vertices, polygons[at] ?? 0, polygons[at + 1] ?? 0, polygons[at + 2] ?? 0);
        continue;
      }
      for (corners = 0; corners < 4; corners++) polygon[corners] = polygons[at + corners] ?? 0;
      endPolygon();
    }
  }

  /** The triangles of a polygon whose fan would fold back on itself; undefined where the fan is what there is. */
  function cutFolded(): Uint32Array | undefined {
    const { planar, folded, normal } = findPolygonShape(vertices, polygon, corners);
    if (!planar) {
      note(remarks.nonPlanarPolygons);
      remarks.polygonVolume += measurePolygonDoubt(vertices, polygon, corners);
    }
    const triangles = folded && planar ? cutPolygon(vertices, polygon, corners, normal) : undefined;
    if (folded && triangles === undefined) note(remarks.foldedPolygons);
    return triangles;
  }

  function note(remark: Remark): void {
    remark.count += 1;
    if (remark.facets.length < findingFacets) remark.facets.push(writer.count);
  }

  return {
    addVertex,
    addVertices,
    beginPolygon: () => {
      corners = 0;
    },
    addCorner,
    endPolygon,
    addPolygons,
    finish() {
      writer.finish();
      return remarks;
    },
    get vertexCount() {
      return vertexCount;
    },
    get vertexRoom() {
      return limits.maximumVertices - vertexCount;
    },
    get corners() {
      return corners;
    },
    get facets() {
      return writer.count;
    },
    get facetRoom() {
      return limits.maximumFacets - writer.count;
    },
  };
}
