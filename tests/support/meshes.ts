import { writeAsciiStl, writeBinaryStl } from '@masswright/geometry';

export type Point = readonly [number, number, number];

/** The twelve facets of a block from `min` to `max`, nine coordinates each, counter-clockwise seen from outside. */
export function blockFacets(min: Point, max: Point): number[] {
  const at = (x: number, y: number, z: number): Point => [x ? max[0] : min[0], y ? max[1] : min[1], z ? max[2] : min[2]];
  const quads: [Point, Point, Point, Point][] = [
    [at(0, 0, 0), at(0, 1, 0), at(1, 1, 0), at(1, 0, 0)],
    [at(0, 0, 1), at(1, 0, 1), at(1, 1, 1), at(0, 1, 1)],
    [at(0, 0, 0), at(1, 0, 0), at(1, 0, 1), at(0, 0, 1)],
    [at(0, 1, 0), at(0, 1, 1), at(1, 1, 1), at(1, 1, 0)],
    [at(0, 0, 0), at(0, 0, 1), at(0, 1, 1), at(0, 1, 0)],
    [at(1, 0, 0), at(1, 1, 0), at(1, 1, 1), at(1, 0, 1)],
  ];
  return quads.flatMap(([a, b, c, d]) => [...a, ...b, ...c, ...a, ...c, ...d]);
}

export const block = (min: Point, max: Point): Uint8Array<ArrayBuffer> => writeBinaryStl(blockFacets(min, max));
export const asciiBlock = (min: Point, max: Point): Uint8Array<ArrayBuffer> => writeAsciiStl(blockFacets(min, max));

/** A closed sphere of about `facets` facets around the origin. */
export function sphere(radius: number, facets: number): Uint8Array<ArrayBuffer> {
  const rings = Math.max(3, Math.round(Math.sqrt(facets / 4)));
  const segments = 2 * rings;
  const point = (ring: number, segment: number): Point => {
    if (ring === 0) return [0, 0, radius];
    if (ring === rings) return [0, 0, -radius];
    const polar = (Math.PI * ring) / rings;
    const azimuth = (2 * Math.PI * (segment % segments)) / segments;
    return [radius * Math.sin(polar) * Math.cos(azimuth), radius * Math.sin(polar) * Math.sin(azimuth), radius * Math.cos(polar)];
  };
  const corners: number[] = [];
  for (let ring = 0; ring < rings; ring++) {
    for (let segment = 0; segment < segments; segment++) {
      const [a, b, c, d] = [point(ring, segment), point(ring + 1, segment), point(ring + 1, segment + 1), point(ring, segment + 1)] as const;
      if (ring < rings - 1) corners.push(...a, ...b, ...c);
      if (ring > 0) corners.push(...a, ...c, ...d);
    }
  }
  return writeBinaryStl(corners);
}

/** The same facets as an OBJ: each corner a vertex of its own. */
export function writeObj(facets: readonly number[]): Uint8Array<ArrayBuffer> {
  const lines = ['# written by a test', 'o body'];
  for (let at = 0; at < facets.length; at += 3) lines.push(`v ${facets[at]} ${facets[at + 1]} ${facets[at + 2]}`);
  for (let corner = 1; corner <= facets.length / 3; corner += 3) lines.push(`f ${corner} ${corner + 1} ${corner + 2}`);
  return new TextEncoder().encode(`${lines.join('\n')}\n`);
}

export const objBlock = (min: Point, max: Point): Uint8Array<ArrayBuffer> => writeObj(blockFacets(min, max));
