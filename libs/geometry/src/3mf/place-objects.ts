import { composeAffine, findDeterminant, identity, mapPoint, type Affine } from '../affine';
import type { FacetWriter } from '../facet-writer';
import type { ReadingLimits } from '../limits';
import { MeshError, spellCount, type MeshErrorCode } from '../mesh-error';
import { isCoordinate, showText } from '../mesh-words';
import { isInsideOut } from './check-fill';
import type { ModelObject, ModelPart, Reference } from './model-part';

/** What becomes of the objects that are built. */
export interface PlacedObjects {
  /** Triangles that will be written. */
  readonly facets: number;
  /** Meshes that are placed, each as often as it is. */
  readonly bodies: number;
  /** Names of the materials of the objects that are placed. */
  readonly materials: readonly string[];
  /** Types of objects that are no body, and are left out. */
  readonly leftOut: readonly string[];
  /** Writes the triangles of all objects, in the order of the file. */
  write(writer: FacetWriter): void;
}

/** An object, and what all in it comes to. */
interface Resolved {
  object: ModelObject;
  part: ModelPart;
  facets: number;
  bodies: number;
  children: { affine: Affine; target: Resolved }[];
}

/**
 * Follows the items that a model says are built to the objects that they place. Only objects of type "model" are body. Throws a MeshError for an object that is missing, or
 * stands in itself.
 *
 * @param getPart the part of a name, which may be read only then
 */
export function placeObjects(root: ModelPart, getPart: (name: string) => ModelPart, { maximumDepth }: Pick<ReadingLimits, 'maximumDepth'>): PlacedObjects {
  const resolved = new Map<ModelObject, Resolved | 'begun'>();
  const leftOut = new Set<string>();
  const materials = new Set<string>();

  function follow(reference: Reference, from: ModelPart, depth: number): Resolved {
    const part = reference.part === undefined || reference.part === from.name ? from : getPart(reference.part);
    const object = part.objects.get(reference.objectId) ?? refuse(from, reference.line, 'syntax-invalid', `refers to the object ${reference.objectId}, which is not there`);
    const known = resolved.get(object);
    if (known === 'begun') return refuse(part, object.line, 'syntax-invalid', `has the object ${object.id}, which stands in itself`);
    if (depth > maximumDepth) refuse(part, object.line, 'syntax-invalid', `has objects more than ${maximumDepth} deep in one another`);
    return known ?? resolve(object, part, depth);
  }

  function resolve(object: ModelObject, part: ModelPart, depth: number): Resolved {
    const own: Resolved = { object, part, facets: object.triangleCount, bodies: object.triangleCount > 0 ? 1 : 0, children: [] };
    if (object.type !== 'model') {
      leftOut.add(object.type);
      Object.assign(own, { facets: 0, bodies: 0 });
    } else {
      if (object.triangleCount > 0 && isInsideOut(object)) refuse(part, object.line, 'syntax-invalid', `has the object ${object.id}, whose triangles look inwards: by the rule of 3MF nothing of it is filled. Turn its facets`);
      resolved.set(object, 'begun');
      for (const component of object.components) {
        const target = follow(component, part, depth + 1);
        own.facets += target.facets;
        own.bodies += target.bodies;
        // What places nothing need not be looked at again, however often it is placed.
        if (target.facets > 0) own.children.push({ affine: component.affine, target });
      }
      for (const material of object.materials) if (part.materialNames.has(material)) materials.add(part.materialNames.get(material) ?? '');
    }
    resolved.set(object, own);
    return own;
  }

  const items = root.items.map((item) => ({ affine: item.affine, target: follow(item, root, 1) })).filter(({ target }) => target.facets > 0);
  return {
    facets: items.reduce((sum, { target }) => sum + target.facets, 0),
    bodies: items.reduce((sum, { target }) => sum + target.bodies, 0),
    materials: [...materials],
    leftOut: [...leftOut],
    write(writer) {
      for (const { affine, target } of items) writeObject(target, affine, writer);
    },
  };
}

function refuse({ name }: ModelPart, line: number, code: MeshErrorCode, what: string): never {
  throw new MeshError(code, `Line ${spellCount(line)} of ${showText(name, 60)} in this 3MF file ${what}. Export it again.`, { line });
}

function writeObject({ object, part, children }: Resolved, affine: Affine, writer: FacetWriter): void {
  writeMesh(object, part, affine, writer);
  for (const child of children) writeObject(child.target, composeAffine(affine, child.affine), writer);
}

/** What a mirroring transform places is read the other way round, so that its volume stays positive. */
function writeMesh({ vertices, triangles, triangleCount, line }: ModelObject, part: ModelPart, affine: Affine, writer: FacetWriter): void {
  const mirrors = findDeterminant(affine) < 0;
  const placed = new Float64Array(9);
  for (let at = 0; at < 3 * triangleCount; at += 3) {
    const a = triangles[at] ?? 0, b = triangles[at + (mirrors ? 2 : 1)] ?? 0, c = triangles[at + (mirrors ? 1 : 2)] ?? 0;
    if (affine === identity) {
      writer.add(vertices, a, b, c);
      continue;
    }
    mapPoint(affine, vertices, 3 * a, placed, 0);
    mapPoint(affine, vertices, 3 * b, placed, 3);
    mapPoint(affine, vertices, 3 * c, placed, 6);
    if (!placed.every(isCoordinate)) refuse(part, line, 'number-not-finite', 'has an object that is placed beyond 3.4e38');
    writer.add(placed, 0, 1, 2);
  }
}
